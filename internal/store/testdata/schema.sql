CREATE TABLE goose_db_version (
		id INTEGER PRIMARY KEY AUTOINCREMENT,
		version_id INTEGER NOT NULL,
		is_applied INTEGER NOT NULL,
		tstamp TIMESTAMP DEFAULT (datetime('now'))
	);

CREATE TABLE project (
	id       INTEGER PRIMARY KEY,
	name     TEXT    NOT NULL,
	created  TEXT    NOT NULL, -- RFC 3339, UTC, milliseconds
	updated  TEXT    NOT NULL, -- RFC 3339, UTC, milliseconds
	archived INTEGER NOT NULL DEFAULT 0 CHECK (archived IN (0, 1)),
	head     INTEGER NOT NULL, -- number of the current revision
	FOREIGN KEY (id, head) REFERENCES revision (project_id, number) DEFERRABLE INITIALLY DEFERRED
) STRICT;

CREATE TABLE revision (
	project_id INTEGER NOT NULL REFERENCES project (id),
	number     INTEGER NOT NULL CHECK (number >= 1),
	parent     INTEGER, -- null in the first revision only
	name       TEXT    NOT NULL,
	summary    TEXT    NOT NULL, -- what changed, in words
	saved      TEXT    NOT NULL, -- RFC 3339, UTC, milliseconds
	engine     TEXT    NOT NULL, -- version of the program that saved it
	doc        TEXT    NOT NULL CHECK (json_valid(doc)),
	PRIMARY KEY (project_id, number),
	FOREIGN KEY (project_id, parent) REFERENCES revision (project_id, number),
	CHECK ((parent IS NULL) = (number = 1)),
	CHECK (parent IS NULL OR parent < number)
) STRICT;

CREATE TABLE snapshot (
	project_id INTEGER NOT NULL,
	number     INTEGER NOT NULL, -- of the revision
	name       TEXT    NOT NULL CHECK (name <> ''),
	PRIMARY KEY (project_id, number),
	FOREIGN KEY (project_id, number) REFERENCES revision (project_id, number)
) STRICT, WITHOUT ROWID;

CREATE INDEX revision_parent ON revision (project_id, parent);

