package store

import (
	"context"
	"database/sql"
	"errors"
	"fmt"
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
	*sql.Tx
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
	tx, err := s.writes.BeginTx(context.Background(), nil)
	if err != nil {
		return nil, err
	}
	defer tx.Rollback() // does nothing after a commit
	g := &group{Tx: tx, states: make(map[ID]*state)}
	answers := make([]error, len(jobs))
	for i, j := range jobs {
		err := j.run(g)
		if r := (refused{}); err != nil && !errors.As(err, &r) {
			return nil, err
		}
		answers[i] = err
	}
	if err := tx.Commit(); err != nil {
		return nil, err
	}
	for id, state := range g.states {
		s.sheets.Put(id, state, state.weight())
	}
	for _, after := range g.after {
		after()
	}
	return answers, nil
}
