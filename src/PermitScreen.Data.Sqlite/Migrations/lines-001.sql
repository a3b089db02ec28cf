PRAGMA application_id = 1347636302;

CREATE TABLE lines (
    key BLOB PRIMARY KEY,
    blob BLOB NOT NULL
) STRICT;

-- Made with the file at random, so that whoever noted it down sees that the file is another one.
CREATE TABLE identity (
    id INTEGER PRIMARY KEY CHECK (id = 1),
    value BLOB NOT NULL
) STRICT;
