CREATE TABLE goose_db_version (
		id INTEGER PRIMARY KEY AUTOINCREMENT,
		version_id INTEGER NOT NULL,
		is_applied INTEGER NOT NULL,
		tstamp TIMESTAMP DEFAULT (datetime('now'))
	);

CREATE TABLE imported (
	id          INTEGER PRIMARY KEY,
	original_id INTEGER NOT NULL REFERENCES original (id),
	project_id  INTEGER NOT NULL,
	revision    INTEGER NOT NULL, -- whose document holds the table as it was filled
	variant     TEXT    NOT NULL, -- identifier of the variant
	path        TEXT    NOT NULL, -- of the table within the variant's aircraft
	header      TEXT    NOT NULL, -- heads of the sheet: those of one kind have the same
	mapping     TEXT    NOT NULL CHECK (json_valid(mapping)),
	saved       TEXT    NOT NULL, -- RFC 3339, UTC, milliseconds
	FOREIGN KEY (project_id, revision) REFERENCES revision (project_id, number)
) STRICT;

CREATE TABLE original (
	id         INTEGER PRIMARY KEY,
	project_id INTEGER NOT NULL REFERENCES project (id),
	name       TEXT    NOT NULL, -- of the file, as the browser told it
	saved      TEXT    NOT NULL, -- RFC 3339, UTC, milliseconds
	content    BLOB    NOT NULL
) STRICT;

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

CREATE INDEX imported_original ON imported (original_id);

CREATE INDEX imported_table ON imported (project_id, path);

CREATE INDEX original_project ON original (project_id);

CREATE INDEX revision_parent ON revision (project_id, parent);

