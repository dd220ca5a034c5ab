package web

import (
	"context"
	"errors"
	"fmt"
	"net/http"
	"runtime/debug"
	"time"

	"loopwright/schematic"
	"loopwright/schematic/cases"
	"loopwright/web/store"
)

// mostSolved bounds what is remembered of solutions, counted in parts times cases.
const mostSolved = 200_000

// solvedSheet is a sheet at a revision, and its solution. It is shared and must not be changed.
type solvedSheet struct {
	Sheet    *schematic.Sheet
	Revision int
	Result   *cases.Result
}

type solutionKey struct {
	sheet    store.ID
	revision int
}

// solved gives a sheet at a revision with its solution. Solutions are remembered for a while, and those who ask for the
// same one at the same time wait for one solver.
func (s *Server) solved(ctx context.Context, id store.ID, revision int) (*solvedSheet, error) {
	key := solutionKey{id, revision}
	if known, ok := s.solutions.Get(key); ok {
		return known, nil
	}
	// Who asked first may go away while others wait, so the work does not end with his request.
	working := context.WithoutCancel(ctx)
	done := s.solving.DoChan(fmt.Sprint(key), func() (any, error) {
		sheet, err := s.store.At(working, id, revision)
		if err != nil {
			return nil, err
		}
		result, err := s.solve(working, sheet)
		if err != nil {
			return nil, err
		}
		whole := &solvedSheet{Sheet: sheet, Revision: revision, Result: result}
		s.solutions.Put(key, whole, min(100+len(sheet.Parts)*len(sheet.Cases), mostSolved))
		return whole, nil
	})
	select {
	case answer := <-done:
		if answer.Err != nil {
			return nil, answer.Err
		}
		return answer.Val.(*solvedSheet), nil
	case <-ctx.Done():
		return nil, ctx.Err()
	}
}

// solve works out all cases of a sheet within the time that the server allows. As many solutions as there are
// processors are worked out at once; the others wait for a while.
func (s *Server) solve(ctx context.Context, sheet *schematic.Sheet) (result *cases.Result, err error) {
	waiting, cancel := context.WithTimeout(ctx, s.waitLimit)
	defer cancel()
	if err := s.slots.Acquire(waiting, 1); err != nil {
		return nil, &problem{status: http.StatusServiceUnavailable,
			message: "The server is busy with other solutions; try again in a moment."}
	}
	defer s.slots.Release(1)
	limited, cancel := context.WithTimeout(ctx, s.solveLimit)
	defer cancel()
	// The work may run outside of any handler, where a panic would end the server.
	defer func() {
		if cause := recover(); cause != nil {
			err = fmt.Errorf("solving panicked: %v\n%s", cause, debug.Stack())
		}
	}()
	start := time.Now()
	defer func() { s.meters.solves.Update(time.Since(start).Seconds()) }()
	result, err = cases.Solve(limited, sheet)
	if errors.Is(err, context.DeadlineExceeded) && ctx.Err() == nil {
		return nil, &problem{status: http.StatusServiceUnavailable, message: fmt.Sprintf(
			"Solving this sheet takes longer than %v, the most that the server gives it; divide the sheet, or solve it with the command line.",
			s.solveLimit)}
	}
	return result, err
}
