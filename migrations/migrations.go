// Package migrations holds the steps that bring a database to the present
// schema, in goose's form. They only go forward: a database is taken back by
// its backup. A released file is never edited; a change is a new file with
// the next number.
package migrations

import "embed"

//go:embed *.sql
var Files embed.FS
