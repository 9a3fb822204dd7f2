-- +goose Up

-- Files from which tables of a project were filled, as they came.
CREATE TABLE original (
	id         INTEGER PRIMARY KEY,
	project_id INTEGER NOT NULL REFERENCES project (id),
	name       TEXT    NOT NULL, -- of the file, as the browser told it
	saved      TEXT    NOT NULL, -- RFC 3339, UTC, milliseconds
	content    BLOB    NOT NULL
) STRICT;

CREATE INDEX original_project ON original (project_id);

-- One row each time a table was filled from an original.
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

CREATE INDEX imported_table ON imported (project_id, path);
CREATE INDEX imported_original ON imported (original_id);
