CREATE TABLE sheets (
    id       INTEGER PRIMARY KEY,
    revision INTEGER NOT NULL, -- the newest one; the first is 1
    created  INTEGER NOT NULL  -- Unix time in milliseconds
) STRICT;

CREATE TABLE snapshots (
    sheet    INTEGER NOT NULL REFERENCES sheets (id),
    revision INTEGER NOT NULL,
    content  TEXT NOT NULL, -- the whole sheet, as a sheet file
    PRIMARY KEY (sheet, revision)
) STRICT;

CREATE TABLE batches (
    sheet  INTEGER NOT NULL REFERENCES sheets (id),
    id     TEXT NOT NULL,    -- UUID, chosen by whoever sent it
    author TEXT NOT NULL,    -- a UUID, or what stands for the key that was used
    edits  TEXT NOT NULL,    -- JSON; a record that nothing reads back
    at     INTEGER NOT NULL, -- Unix time in milliseconds
    answer TEXT NOT NULL,    -- JSON
    PRIMARY KEY (sheet, id)
) STRICT;

CREATE TABLE log (
    sheet    INTEGER NOT NULL REFERENCES sheets (id),
    revision INTEGER NOT NULL, -- which this row made
    batch    TEXT NOT NULL,
    author   TEXT NOT NULL,    -- whose undo reaches this row
    act      TEXT NOT NULL CHECK (act IN ('edit', 'undo', 'redo')),
    target   INTEGER,          -- the revision that was undone or redone
    change   TEXT NOT NULL,    -- JSON: everything touched, as it was before and as it is after
    format   TEXT NOT NULL,    -- of change
    PRIMARY KEY (sheet, revision),
    FOREIGN KEY (sheet, batch) REFERENCES batches (sheet, id)
) STRICT;

CREATE INDEX log_by_author ON log (sheet, author, revision);

CREATE TABLE keys (
    hash    BLOB PRIMARY KEY, -- SHA-256 of the key
    sheet   INTEGER NOT NULL REFERENCES sheets (id),
    role    TEXT NOT NULL CHECK (role IN ('edit', 'review', 'view')),
    name    TEXT NOT NULL,    -- whom it was made for; empty for the edit key
    salt    BLOB NOT NULL,    -- with which it was derived from the edit key; empty for the edit key itself
    created INTEGER NOT NULL, -- Unix time in milliseconds, like the others
    expires INTEGER,          -- null: never
    revoked INTEGER           -- null: it is good
) STRICT;

CREATE UNIQUE INDEX keys_by_name ON keys (sheet, name) WHERE revoked IS NULL;
