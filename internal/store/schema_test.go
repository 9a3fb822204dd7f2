package store

import (
	"flag"
	"os"
	"strings"
	"testing"
)

var update = flag.Bool("update", false, "write testdata/schema.sql anew")

func schema(t *testing.T, db *DB) string {
	t.Helper()
	rows, err := db.sql.Query("SELECT sql FROM sqlite_schema WHERE sql IS NOT NULL AND name NOT LIKE 'sqlite_%' ORDER BY type DESC, name")
	if err != nil {
		t.Fatal(err)
	}
	defer rows.Close()
	var b strings.Builder
	for rows.Next() {
		var s string
		if err := rows.Scan(&s); err != nil {
			t.Fatal(err)
		}
		b.WriteString(s + ";\n\n")
	}
	if err := rows.Err(); err != nil {
		t.Fatal(err)
	}
	return b.String()
}

func TestSchema(t *testing.T) {
	const golden = "testdata/schema.sql"
	got := schema(t, newDB(t))
	if *update {
		if err := os.WriteFile(golden, []byte(got), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	if want := string(read(t, golden)); got != want {
		t.Errorf("the schema of a new database is\n%s\nwant\n%s", got, want)
	}
}
