package store

import (
	"context"
	"database/sql"
	"errors"
	"fmt"

	"loopwright/schematic"
)

// The bounds of a stored sheet. Files that are only solved have none.
const (
	mostParts = 5_000
	mostWires = 20_000
	mostCases = 500
)

// between is how many revisions lie between two snapshots of a sheet.
const between = 50

// state is a sheet at its newest revision, as it is held in memory. It is not changed once it is made.
type state struct {
	sheet    *schematic.Sheet
	revision int
	// tails holds the last log entries of those authors who have undone something since the sheet was loaded.
	tails map[string][]schematic.Entry
}

// weight is what a state counts in memory.
func (s *state) weight() int { return 100 + len(s.sheet.Parts) + len(s.sheet.Wires) }

// querier is the database or a transaction.
type querier interface {
	QueryContext(ctx context.Context, query string, args ...any) (*sql.Rows, error)
	QueryRowContext(ctx context.Context, query string, args ...any) *sql.Row
}

// Create stores a new sheet, and gives its edit key and its first revision. A sheet that is too large is a
// *schematic.PlaceError.
func (s *Store) Create(ctx context.Context, sheet *schematic.Sheet) (id ID, editKey string, revision int, err error) {
	if err := bounded(sheet); err != nil {
		return 0, "", 0, err
	}
	editKey = newKey()
	content := schematic.Encode(sheet)
	err = s.do(ctx, func(g *group) error {
		result, err := g.exec("INSERT INTO sheets (revision, created) VALUES (1, ?)", s.Now().UnixMilli())
		if err != nil {
			return err
		}
		number, err := result.LastInsertId()
		if err != nil {
			return err
		}
		id = ID(number)
		if err := insertSnapshot(g, id, 1, content); err != nil {
			return err
		}
		return s.insertKey(g, editKey, id, Edit, "", []byte{}, sql.NullInt64{})
	})
	if err != nil {
		return 0, "", 0, err
	}
	return id, editKey, 1, nil
}

// bounded refuses a sheet that is too large to be stored.
func bounded(sheet *schematic.Sheet) error {
	for _, bound := range []struct {
		place, what string
		count, most int
	}{
		{"parts", "parts", len(sheet.Parts), mostParts},
		{"wires", "wires", len(sheet.Wires), mostWires},
		{"cases", "operating cases", len(sheet.Cases), mostCases},
	} {
		if bound.count > bound.most {
			return &schematic.PlaceError{Place: bound.place, Message: fmt.Sprintf(
				"a stored sheet holds at most %d %s, this would be %d; divide it into several sheets",
				bound.most, bound.what, bound.count)}
		}
	}
	return nil
}

func insertSnapshot(g *group, id ID, revision int, content []byte) error {
	_, err := g.exec("INSERT INTO snapshots (sheet, revision, content) VALUES (?, ?, ?)", id, revision, string(content))
	return err
}

// Sheet gives a sheet at its newest revision.
func (s *Store) Sheet(ctx context.Context, id ID) (*schematic.Sheet, int, error) {
	current, err := s.newest(ctx, s.reads, id)
	if err != nil {
		return nil, 0, err
	}
	return current.sheet, current.revision, nil
}

// At gives a sheet as it was at a revision, or ErrNotFound.
func (s *Store) At(ctx context.Context, id ID, revision int) (*schematic.Sheet, error) {
	known, ok := s.sheets.Get(id)
	if ok && known.revision == revision {
		return known.sheet, nil
	}
	current, err := newestRevision(ctx, s.reads, id)
	if err != nil {
		return nil, err
	}
	if revision < 1 || revision > current {
		return nil, ErrNotFound
	}
	return load(ctx, s.reads, id, revision)
}

// newest gives the state of a sheet from memory when that is up to date, else from the database.
func (s *Store) newest(ctx context.Context, from querier, id ID) (*state, error) {
	revision, err := newestRevision(ctx, from, id)
	if err != nil {
		return nil, err
	}
	if known, ok := s.sheets.Get(id); ok && known.revision == revision {
		return known, nil
	}
	sheet, err := load(ctx, from, id, revision)
	if err != nil {
		return nil, err
	}
	current := &state{sheet: sheet, revision: revision}
	s.remember(id, current)
	return current, nil
}

// remember keeps a durable state in memory, unless a newer one is there.
func (s *Store) remember(id ID, current *state) {
	if known, ok := s.sheets.Get(id); !ok || known.revision < current.revision {
		s.sheets.Put(id, current, current.weight())
	}
}

func newestRevision(ctx context.Context, from querier, id ID) (int, error) {
	var revision int
	err := from.QueryRowContext(ctx, "SELECT revision FROM sheets WHERE id = ?", id).Scan(&revision)
	if errors.Is(err, sql.ErrNoRows) {
		return 0, ErrNotFound
	}
	if err != nil {
		return 0, fmt.Errorf("looking up a sheet: %w", err)
	}
	return revision, nil
}

// load rebuilds a sheet from the snapshot before a revision and the changes since.
func load(ctx context.Context, from querier, id ID, revision int) (*schematic.Sheet, error) {
	var base int
	var content []byte
	err := from.QueryRowContext(ctx, `SELECT revision, content FROM snapshots
		WHERE sheet = ? AND revision <= ? ORDER BY revision DESC LIMIT 1`, id, revision).Scan(&base, &content)
	if err != nil {
		return nil, fmt.Errorf("reading a snapshot of sheet %d: %w", id, err)
	}
	sheet, err := schematic.Decode(content)
	if err != nil {
		return nil, fmt.Errorf("sheet %d, snapshot %d: %w", id, base, err)
	}
	entries, err := entriesOf(from.QueryContext(ctx, `SELECT revision, author, act, target, change FROM log
		WHERE sheet = ? AND revision > ? AND revision <= ? ORDER BY revision`, id, base, revision))
	if err != nil {
		return nil, err
	}
	for _, entry := range entries {
		if sheet, err = schematic.Replay(sheet, entry.Change); err != nil {
			return nil, fmt.Errorf("sheet %d, revision %d: %w", id, entry.Revision, err)
		}
	}
	return sheet, nil
}
