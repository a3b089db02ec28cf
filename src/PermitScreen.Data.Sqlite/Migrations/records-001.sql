PRAGMA application_id = 1347634002;

CREATE TABLE version (
    id INTEGER PRIMARY KEY CHECK (id = 1),
    timeline BLOB NOT NULL,
    version INTEGER NOT NULL,
    state BLOB NOT NULL,
    audit_sequence INTEGER NOT NULL,
    audit_hash BLOB NOT NULL,
    "check" BLOB NOT NULL
) STRICT;

CREATE TABLE change_sets (
    version INTEGER PRIMARY KEY,
    previous INTEGER NOT NULL,
    action TEXT NOT NULL,
    actor TEXT NOT NULL,
    reason TEXT NOT NULL,
    instant_ms INTEGER NOT NULL,
    added INTEGER NOT NULL,
    revised INTEGER NOT NULL,
    removed INTEGER NOT NULL,
    state BLOB NOT NULL,
    "check" BLOB NOT NULL
) STRICT;

CREATE TABLE contents (
    hash BLOB PRIMARY KEY,
    bytes BLOB NOT NULL
) STRICT;

CREATE TABLE content_lines (
    content BLOB NOT NULL REFERENCES contents (hash),
    line BLOB NOT NULL,
    "check" BLOB NOT NULL,
    PRIMARY KEY (content, line)
) STRICT, WITHOUT ROWID;

CREATE TABLE revisions (
    kind INTEGER NOT NULL,
    name TEXT NOT NULL,
    from_version INTEGER NOT NULL REFERENCES change_sets (version),
    to_version INTEGER REFERENCES change_sets (version),
    content BLOB NOT NULL REFERENCES contents (hash),
    actor TEXT NOT NULL,
    reason TEXT NOT NULL,
    instant_ms INTEGER NOT NULL,
    "check" BLOB NOT NULL,
    PRIMARY KEY (kind, name, from_version)
) STRICT, WITHOUT ROWID;

CREATE UNIQUE INDEX revisions_newest ON revisions (kind, name) WHERE to_version IS NULL;

CREATE INDEX revisions_by_from ON revisions (from_version);

CREATE INDEX revisions_by_to ON revisions (to_version) WHERE to_version IS NOT NULL;

CREATE INDEX revisions_by_content ON revisions (content);

-- How many revisions a resource has and where the newest begins and ends: proves that none is missing where one is looked for.
CREATE TABLE resources (
    kind INTEGER NOT NULL,
    name TEXT NOT NULL,
    revisions INTEGER NOT NULL,
    newest_from INTEGER NOT NULL,
    newest_to INTEGER,
    "check" BLOB NOT NULL,
    PRIMARY KEY (kind, name)
) STRICT, WITHOUT ROWID;

CREATE TABLE audit (
    sequence INTEGER PRIMARY KEY,
    action TEXT NOT NULL,
    subject TEXT NOT NULL,
    actor TEXT NOT NULL,
    reason TEXT NOT NULL,
    instant_ms INTEGER NOT NULL,
    version INTEGER,
    records BLOB NOT NULL,
    previous BLOB NOT NULL,
    hash BLOB NOT NULL
) STRICT;

CREATE UNIQUE INDEX audit_by_version ON audit (version) WHERE version IS NOT NULL;

CREATE TABLE requests (
    request_id TEXT PRIMARY KEY,
    fingerprint BLOB NOT NULL,
    version INTEGER NOT NULL,
    content BLOB,
    "check" BLOB NOT NULL
) STRICT, WITHOUT ROWID;

CREATE TABLE backlog (
    line BLOB PRIMARY KEY,
    structure TEXT NOT NULL,
    content BLOB NOT NULL,
    since_ms INTEGER NOT NULL,
    failure TEXT,
    "check" BLOB NOT NULL
) STRICT, WITHOUT ROWID;

CREATE INDEX backlog_pending ON backlog (since_ms, line) WHERE failure IS NULL;

CREATE INDEX backlog_failed ON backlog (since_ms, line) WHERE failure IS NOT NULL;

CREATE TABLE imports (
    number INTEGER PRIMARY KEY,
    import_id TEXT NOT NULL UNIQUE,
    state INTEGER NOT NULL,
    actor TEXT NOT NULL,
    reason TEXT NOT NULL,
    instant_ms INTEGER NOT NULL,
    source_fingerprint TEXT NOT NULL,
    allow_partial INTEGER NOT NULL,
    base_version INTEGER NOT NULL,
    next_piece INTEGER NOT NULL,
    staged INTEGER NOT NULL,
    refused_staging INTEGER NOT NULL,
    refused_publishing INTEGER NOT NULL,
    added INTEGER,
    revised INTEGER,
    unchanged INTEGER,
    published_version INTEGER,
    "check" BLOB NOT NULL
) STRICT;

CREATE TABLE import_pieces (
    import INTEGER NOT NULL REFERENCES imports (number),
    piece INTEGER NOT NULL,
    fingerprint BLOB NOT NULL,
    "check" BLOB NOT NULL,
    PRIMARY KEY (import, piece)
) STRICT, WITHOUT ROWID;

CREATE TABLE import_items (
    import INTEGER NOT NULL REFERENCES imports (number),
    kind INTEGER NOT NULL,
    name TEXT NOT NULL,
    item INTEGER NOT NULL,
    piece INTEGER NOT NULL,
    content BLOB NOT NULL REFERENCES contents (hash),
    origin TEXT NOT NULL,
    "check" BLOB NOT NULL,
    PRIMARY KEY (import, kind, name, item)
) STRICT, WITHOUT ROWID;

CREATE INDEX import_items_by_content ON import_items (content);

-- Refusals found while staging are numbered from 0, those found while publishing after them.
CREATE TABLE import_refusals (
    import INTEGER NOT NULL REFERENCES imports (number),
    place INTEGER NOT NULL,
    piece INTEGER NOT NULL,
    resource TEXT NOT NULL,
    origin TEXT NOT NULL,
    faults TEXT NOT NULL,
    "check" BLOB NOT NULL,
    PRIMARY KEY (import, place)
) STRICT, WITHOUT ROWID;

CREATE TABLE notes (
    name TEXT PRIMARY KEY,
    value TEXT NOT NULL,
    "check" BLOB NOT NULL
) STRICT, WITHOUT ROWID;
