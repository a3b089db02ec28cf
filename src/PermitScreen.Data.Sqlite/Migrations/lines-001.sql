PRAGMA application_id = 1347636302;

CREATE TABLE lines (
    key BLOB PRIMARY KEY,
    blob BLOB NOT NULL
) STRICT;
