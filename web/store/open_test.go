package store

import (
	"context"
	"database/sql"
	"os"
	"path/filepath"
	"strings"
	"testing"
)

// open opens a store for the time of a test.
func open(t testing.TB, name string) *Store {
	t.Helper()
	s, err := Open(context.Background(), name)
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() {
		if err := s.Close(); err != nil {
			t.Error(err)
		}
	})
	return s
}

func TestADatabaseThatCannotBeUsedIsRefusedWithASentence(t *testing.T) {
	directory := t.TempDir()
	foreign := filepath.Join(directory, "foreign.db")
	execute(t, foreign, "CREATE TABLE songs (title TEXT)")
	later := filepath.Join(directory, "later.db")
	open(t, later)
	execute(t, later, "INSERT INTO goose_db_version (version_id, is_applied) VALUES (99999, 1)")
	text := filepath.Join(directory, "text.db")
	if err := os.WriteFile(text, []byte(strings.Repeat("This is a letter and no database. ", 50)), 0o600); err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct{ name, database, says string }{
		{"PostgreSQL", "postgres://localhost/sheets", "a PostgreSQL database cannot be used yet"},
		{"directory does not exist", filepath.Join(directory, "none", "a.db"), "there is no directory"},
		{"directory instead of a file", directory, "is a directory"},
		{"of another program", foreign, "belongs to another program"},
		{"of a later version", later, "a later version of Loopwright"},
		{"not a database", text, "not a database"},
	} {
		t.Run(c.name, func(t *testing.T) {
			_, err := Open(context.Background(), c.database)
			if err == nil || !strings.Contains(err.Error(), c.says) {
				t.Errorf("error is %v, want it to say %q", err, c.says)
			}
		})
	}
	if tables := execute(t, foreign, "SELECT count(*) FROM sqlite_schema"); tables != 1 {
		t.Errorf("the database of another program has %d tables afterwards, want 1", tables)
	}
}

// execute runs a statement on a database file and gives the first number that it answers.
func execute(t *testing.T, name, statement string) (number int) {
	t.Helper()
	db, err := sql.Open("sqlite", name)
	if err != nil {
		t.Fatal(err)
	}
	defer db.Close()
	rows, err := db.Query(statement)
	if err != nil {
		t.Fatal(err)
	}
	defer rows.Close()
	for rows.Next() {
		if err := rows.Scan(&number); err != nil {
			t.Fatal(err)
		}
	}
	if err := rows.Err(); err != nil {
		t.Fatal(err)
	}
	return number
}

func TestNamesWithMarksOfAnAddressAreNamesOfFiles(t *testing.T) {
	name := filepath.Join(t.TempDir(), "pumps & fans?mode=ro#1 100%.db")
	open(t, name)
	info, err := os.Stat(name)
	if err != nil {
		t.Fatal(err)
	}
	if info.Size() == 0 && info.Mode().Perm() != 0o600 {
		t.Errorf("the file has %d bytes and mode %v", info.Size(), info.Mode())
	}
	if entries, _ := os.ReadDir(filepath.Dir(name)); len(entries) > 3 {
		t.Errorf("the store made other files too: %v", entries)
	}
}
