package store

import (
	"context"
	"database/sql"
	"embed"
	"errors"
	"fmt"
	"io/fs"
	"net/url"
	"os"
	"path/filepath"
	"runtime"
	"strings"

	"github.com/pressly/goose/v3"
	_ "modernc.org/sqlite" // the driver "sqlite"
)

//go:embed migrations/*.sql
var migrations embed.FS

// applicationID marks a database file as one of this program; the first migration sets it.
const applicationID = 0x4c6f6f70

// openSQLite opens a database file twice: one connection that writes, and several that only read. The file is made for
// its owner alone when there is none, and brought to the newest form.
func openSQLite(ctx context.Context, name string) (writes, reads *sql.DB, err error) {
	if strings.HasPrefix(name, "postgres://") || strings.HasPrefix(name, "postgresql://") {
		return nil, nil, errors.New("a PostgreSQL database cannot be used yet; name a file")
	}
	if err := makeFile(name); err != nil {
		return nil, nil, err
	}
	writes, err = sql.Open("sqlite", address(name, ""))
	if err != nil {
		return nil, nil, fmt.Errorf("opening the database %s: %w", name, err)
	}
	writes.SetMaxOpenConns(1)
	if err := migrate(ctx, writes); err != nil {
		return nil, nil, errors.Join(fmt.Errorf("the database %s cannot be used: %w", name, err), writes.Close())
	}
	reads, err = sql.Open("sqlite", address(name, "&_pragma=query_only(1)"))
	if err != nil {
		return nil, nil, errors.Join(fmt.Errorf("opening the database %s: %w", name, err), writes.Close())
	}
	reads.SetMaxOpenConns(max(4, 2*runtime.NumCPU()))
	reads.SetMaxIdleConns(max(4, 2*runtime.NumCPU()))
	return writes, reads, nil
}

// makeFile makes an empty file, which is an empty database: SQLite itself would let others read it.
func makeFile(name string) error {
	file, err := os.OpenFile(name, os.O_RDWR|os.O_CREATE, 0o600)
	switch {
	case errors.Is(err, fs.ErrNotExist):
		return fmt.Errorf("the database %s cannot be made: there is no directory %s", name, filepath.Dir(name))
	case errors.Is(err, fs.ErrPermission):
		return fmt.Errorf("the database %s cannot be opened: reading and writing it is not permitted", name)
	case err != nil:
		return fmt.Errorf("the database cannot be opened: %w", err)
	}
	return file.Close()
}

// address gives the name under which the driver opens a file. Synchronous FULL makes a commit durable before it returns.
func address(name, more string) string {
	return "file:" + (&url.URL{Path: name}).EscapedPath() + "?_pragma=busy_timeout(5000)&_pragma=journal_mode(WAL)" +
		"&_pragma=synchronous(FULL)&_pragma=foreign_keys(1)" + more
}

// migrate brings a database to the form that this program knows. It leaves alone what belongs to another program or to
// a later version of this one.
func migrate(ctx context.Context, db *sql.DB) error {
	var application, tables int
	err := db.QueryRowContext(ctx, "SELECT (SELECT count(*) FROM sqlite_schema), application_id FROM pragma_application_id").
		Scan(&tables, &application)
	if err != nil {
		return err
	}
	if tables > 0 && application != applicationID {
		return errors.New("it belongs to another program; name another file")
	}
	files, err := fs.Sub(migrations, "migrations")
	if err != nil {
		return err
	}
	provider, err := goose.NewProvider(goose.DialectSQLite3, db, files, goose.WithDisableGlobalRegistry(true))
	if err != nil {
		return err
	}
	current, target, err := provider.GetVersions(ctx)
	if err != nil {
		return err
	}
	if current > target {
		return errors.New("a later version of Loopwright has written it; use that version")
	}
	_, err = provider.Up(ctx)
	return err
}
