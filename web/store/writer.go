package store

import (
	"context"
	"database/sql"
	"errors"
	"fmt"
	"runtime/debug"
)

// mostJobs is how many writes share one transaction at most.
const mostJobs = 128

// job is a write that waits for its turn.
type job struct {
	run  func(*group) error
	done chan error // takes one answer
}

// group is one transaction, and what it will have changed once it is durable.
type group struct {
	*writer
	states map[ID]*state
	after  []func() // called in order once the transaction is durable
}

// refused marks the error of a job that has written nothing, so that the others of its group can go on.
type refused struct{ error }

func (r refused) Unwrap() error { return r.error }

// do has a function run in a transaction and returns once that is durable. The function may be run more than once, each
// time in a new transaction. When it refuses, it must do so before it writes, with an error of type refused. When the
// context ends before the answer is there, the write may still happen.
func (s *Store) do(ctx context.Context, run func(*group) error) error {
	j := &job{run: run, done: make(chan error, 1)}
	select {
	case s.jobs <- j:
	case <-s.closing:
		return ErrClosed
	case <-ctx.Done():
		return ctx.Err()
	}
	select {
	case err := <-j.done:
		if r := (refused{}); errors.As(err, &r) {
			return r.error
		}
		return err
	case <-ctx.Done():
		return ctx.Err()
	}
}

// write is the goroutine that makes all writes. It takes one job and whatever else waits by then.
func (s *Store) write() {
	jobs := make([]*job, 0, mostJobs)
	for {
		select {
		case j := <-s.jobs:
			jobs = append(jobs[:0], j)
		case <-s.closing:
			return
		}
		for waiting := true; waiting && len(jobs) < mostJobs; {
			select {
			case j := <-s.jobs:
				jobs = append(jobs, j)
			default:
				waiting = false
			}
		}
		s.commit(jobs)
	}
}

// commit makes the jobs durable together and answers them. When one of them fails, each is tried alone, so that it
// takes none of the others with it.
func (s *Store) commit(jobs []*job) {
	answers, err := s.together(jobs)
	if err != nil && len(jobs) > 1 {
		for i := range jobs {
			s.commit(jobs[i : i+1])
		}
		return
	}
	for i, j := range jobs {
		if err != nil {
			j.done <- fmt.Errorf("writing to the database: %w", err)
		} else {
			j.done <- answers[i]
		}
	}
}

// together runs jobs in one transaction. It gives the refusal of each, or an error when nothing has been written.
func (s *Store) together(jobs []*job) ([]error, error) {
	g := &group{writer: s.writer, states: make(map[ID]*state)}
	answers := make([]error, len(jobs))
	err := s.writer.transaction(func() error {
		for i, j := range jobs {
			err := j.attempt(g)
			if r := (refused{}); err != nil && !errors.As(err, &r) {
				return err
			}
			answers[i] = err
		}
		return nil
	})
	if err != nil {
		return nil, err
	}
	for id, state := range g.states {
		s.remember(id, state)
	}
	for _, after := range g.after {
		after()
	}
	return answers, nil
}

// attempt runs a job. A panic is an error of that job alone: the goroutine serves everybody.
func (j *job) attempt(g *group) (err error) {
	defer func() {
		if cause := recover(); cause != nil {
			err = fmt.Errorf("panic: %v\n%s", cause, debug.Stack())
		}
	}()
	return j.run(g)
}

// writer is the one connection that writes. Only the goroutine that makes all writes uses it. It prepares a statement
// once, since that takes as long as to run it.
type writer struct {
	*sql.Conn
	prepared map[string]*sql.Stmt
}

// transaction runs a function between BEGIN and COMMIT. The transaction is open to writing from its start, because one
// that begins by reading can be refused later.
func (w *writer) transaction(run func() error) error {
	if _, err := w.exec("BEGIN IMMEDIATE"); err != nil {
		return err
	}
	err := run()
	if err == nil {
		_, err = w.exec("COMMIT")
	}
	if err != nil {
		// After some errors the database has rolled back already, and says so.
		w.exec("ROLLBACK")
	}
	return err
}

func (w *writer) exec(query string, values ...any) (sql.Result, error) {
	statement, err := w.statement(query)
	if err != nil {
		return nil, err
	}
	return statement.Exec(values...)
}

// queryRow reads one row into the targets; sql.ErrNoRows when there is none.
func (w *writer) queryRow(query string, values []any, targets ...any) error {
	statement, err := w.statement(query)
	if err != nil {
		return err
	}
	return statement.QueryRow(values...).Scan(targets...)
}

func (w *writer) statement(query string) (*sql.Stmt, error) {
	if known := w.prepared[query]; known != nil {
		return known, nil
	}
	statement, err := w.PrepareContext(context.Background(), query)
	if err != nil {
		return nil, err
	}
	w.prepared[query] = statement
	return statement, nil
}
