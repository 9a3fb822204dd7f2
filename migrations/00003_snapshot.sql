-- +goose Up

-- A name that the user gave a revision. It may be changed and taken away; the
-- revision stays.
CREATE TABLE snapshot (
	project_id INTEGER NOT NULL,
	number     INTEGER NOT NULL, -- of the revision
	name       TEXT    NOT NULL CHECK (name <> ''),
	PRIMARY KEY (project_id, number),
	FOREIGN KEY (project_id, number) REFERENCES revision (project_id, number)
) STRICT, WITHOUT ROWID;
