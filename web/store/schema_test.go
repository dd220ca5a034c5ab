package store

import (
	"context"
	"os"
	"path/filepath"
	"strings"
	"testing"
)

// The file schema.sql is what reviewers read: everything that the migrations make, as the database tells it.
func TestAFreshDatabaseIsTheReviewedSchema(t *testing.T) {
	s := open(t, filepath.Join(t.TempDir(), "fresh.db"))
	rows, err := s.reads.QueryContext(context.Background(),
		`SELECT sql FROM sqlite_schema WHERE sql IS NOT NULL AND tbl_name NOT LIKE 'goose%' AND tbl_name NOT LIKE 'sqlite%'
		ORDER BY rowid`)
	if err != nil {
		t.Fatal(err)
	}
	defer rows.Close()
	var fresh []string
	for rows.Next() {
		var statement string
		if err := rows.Scan(&statement); err != nil {
			t.Fatal(err)
		}
		fresh = append(fresh, statement+";\n")
	}
	if err := rows.Err(); err != nil {
		t.Fatal(err)
	}
	got := strings.Join(fresh, "\n")
	reviewed, err := os.ReadFile("schema.sql")
	if err != nil {
		t.Fatal(err)
	}
	if got != string(reviewed) {
		t.Errorf("the migrations make another schema than schema.sql:\n%s", got)
	}
}

func TestTheDatabaseIsDurableAndItsReadersCannotWrite(t *testing.T) {
	s := open(t, filepath.Join(t.TempDir(), "pragmas.db"))
	for pragma, want := range map[string]string{
		"journal_mode": "wal", "synchronous": "2", "foreign_keys": "1", "busy_timeout": "5000",
	} {
		var got string
		err := s.do(context.Background(), func(g *group) error { return g.queryRow("PRAGMA "+pragma, nil, &got) })
		if err != nil {
			t.Fatal(err)
		}
		if got != want {
			t.Errorf("%s is %s, want %s", pragma, got, want)
		}
	}
	if _, err := s.reads.Exec("DELETE FROM sheets"); err == nil {
		t.Error("a connection for reading has deleted rows")
	}
}
