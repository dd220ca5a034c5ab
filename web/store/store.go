// Package store keeps sheets: their log of changes, their snapshots, and the keys that open them.
//
// Every write goes through one goroutine, which puts what is waiting into one transaction and answers once it is
// durable. Nothing that was answered is lost when the process or the machine stops. Sheets are also held in memory, but
// only to save time: the database decides.
//
// A sheet that the package hands out is shared with others and must not be changed.
package store

import (
	"context"
	"database/sql"
	"errors"
	"fmt"
	"sync"
	"time"

	"loopwright/web/recent"
)

// The ways in which a call is refused, beside the errors of package schematic that Commit and Share hand on.
var (
	// ErrNotFound says that a key opens nothing (unknown, withdrawn and expired are the same), or that a key name, a
	// sheet or a revision does not exist.
	ErrNotFound = errors.New("not found")
	// ErrNotAllowed says that the key is good, but not for this.
	ErrNotAllowed = errors.New("the key does not allow this")
	// ErrNameTaken says that the sheet has a key of that name already.
	ErrNameTaken = errors.New("the sheet has a key of that name already")
	// ErrClosed says that the store has been closed.
	ErrClosed = errors.New("the store is closed")
)

// ID names a sheet within the store.
type ID int64

// Store is an open database of sheets. It may be used from several goroutines at once.
type Store struct {
	// Now tells the time; tests may set it before the first call.
	Now func() time.Time

	reads    *sql.DB
	writes   *sql.DB
	writer   *writer
	jobs     chan *job
	closing  chan struct{}
	finished sync.WaitGroup
	close    func() error
	sheets   *recent.Map[ID, *state]
	notices  notices
}

// held is how many sheets are kept in memory, counted in parts and wires.
const held = 200_000

// Open opens the database in a file, and makes it when there is none. The caller must Close the store.
func Open(ctx context.Context, name string) (*Store, error) {
	writes, reads, err := openSQLite(ctx, name)
	if err != nil {
		return nil, err
	}
	connection, err := writes.Conn(ctx)
	if err != nil {
		return nil, errors.Join(fmt.Errorf("opening the database %s: %w", name, err), reads.Close(), writes.Close())
	}
	s := &Store{
		Now:     time.Now,
		reads:   reads,
		writes:  writes,
		writer:  &writer{connection, make(map[string]*sql.Stmt)},
		jobs:    make(chan *job),
		closing: make(chan struct{}),
		sheets:  recent.New[ID, *state](held),
	}
	s.finished.Go(s.write)
	s.close = sync.OnceValue(func() error {
		close(s.closing)
		s.finished.Wait()
		return errors.Join(s.writer.Close(), s.writes.Close(), s.reads.Close())
	})
	return s, nil
}

// Close answers what has been taken on, refuses everything after, and closes the database.
func (s *Store) Close() error { return s.close() }

// Ready reports whether the database answers to reading and to writing.
func (s *Store) Ready(ctx context.Context) error {
	var one int
	if err := s.reads.QueryRowContext(ctx, "SELECT 1").Scan(&one); err != nil {
		return fmt.Errorf("reading from the database: %w", err)
	}
	return s.do(ctx, func(*group) error { return nil })
}
