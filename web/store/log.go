package store

import (
	"context"
	"database/sql"
	"encoding/json"
	"errors"
	"fmt"
	"maps"

	"github.com/google/uuid"

	"loopwright/schematic"
)

// Batch is a list of edits that is applied whole or not at all.
type Batch struct {
	ID     uuid.UUID // chosen by whoever sends it, once for each batch
	Base   int       // the revision that the author had seen
	Author string    // whose undo and redo are meant: everybody has only his own
	Edits  []schematic.Edit
	Record []byte // the edits as they were sent, as JSON; kept beside their effect
}

// Answer is what an accepted batch is answered.
type Answer struct {
	Revision int            `json:"revision"`
	Made     schematic.Made `json:"made"`
}

// Commit applies a batch and returns once it is durable. A batch that has been accepted before changes nothing and gives
// the same answer. A refused batch leaves no trace: *schematic.ConflictError says that the sheet is no longer what the
// edits suppose, and its answer holds the newest revision; *schematic.PlaceError says that they make no sense. Each
// undo, each redo, and each run of edits between them makes a revision, unless it changes nothing.
func (s *Store) Commit(ctx context.Context, id ID, batch Batch) (Answer, error) {
	// What is not in memory yet is loaded here, so that the writer does not wait for it.
	if _, _, err := s.Sheet(ctx, id); err != nil {
		return Answer{}, err
	}
	var answer Answer
	err := s.do(ctx, func(g *group) error {
		var err error
		answer, err = s.apply(g, id, batch)
		return err
	})
	if err != nil && ctx.Err() != nil {
		return Answer{}, err // the writer may still be at it
	}
	return answer, err
}

// apply works out what a batch makes of its sheet and writes that down.
func (s *Store) apply(g *group, id ID, batch Batch) (Answer, error) {
	answer, found, err := answered(g, id, batch.ID)
	if found || err != nil {
		return answer, err
	}
	current := g.states[id]
	if current == nil {
		if current, err = s.newest(context.Background(), g, id); err != nil {
			return Answer{}, err
		}
	}
	tail, err := current.tail(g, id, batch)
	if err != nil {
		return Answer{}, err
	}
	next := plan{sheet: current.sheet, revision: current.revision, tail: tail}
	if err := next.take(batch); err != nil {
		return Answer{Revision: current.revision}, refused{err}
	}
	answer = Answer{Revision: next.revision, Made: next.made}
	if err := s.insertBatch(g, id, batch, answer); err != nil {
		return Answer{}, err
	}
	for _, entry := range next.entries {
		if err := insertEntry(g, id, batch.ID, entry); err != nil {
			return Answer{}, err
		}
	}
	if next.revision == current.revision {
		return answer, nil
	}
	if next.revision/between > current.revision/between {
		if err := insertSnapshot(g, id, next.revision, schematic.Encode(next.sheet)); err != nil {
			return Answer{}, err
		}
	}
	g.states[id] = current.followed(next, batch.Author)
	g.after = append(g.after, func() { s.notices.tell(id, next.revision) })
	return answer, setRevision(g, id, next.revision)
}

// followed is the state that comes of a plan.
func (s *state) followed(next plan, author string) *state {
	tails := s.tails
	if next.tail != nil {
		tails = maps.Clone(tails)
		if tails == nil {
			tails = make(map[string][]schematic.Entry)
		}
		tails[author] = next.tail
	}
	return &state{sheet: next.sheet, revision: next.revision, tails: tails}
}

// answered gives the answer of a batch that has been accepted before.
func answered(g *group, id ID, batch uuid.UUID) (answer Answer, found bool, err error) {
	var stored []byte
	err = g.QueryRow("SELECT answer FROM batches WHERE sheet = ? AND id = ?", id, batch.String()).Scan(&stored)
	if errors.Is(err, sql.ErrNoRows) {
		return Answer{}, false, nil
	}
	if err != nil {
		return Answer{}, false, err
	}
	return answer, true, json.Unmarshal(stored, &answer)
}

func (s *Store) insertBatch(g *group, id ID, batch Batch, answer Answer) error {
	stored, err := json.Marshal(answer)
	if err != nil {
		return err
	}
	_, err = g.Exec("INSERT INTO batches (sheet, id, author, edits, at, answer) VALUES (?, ?, ?, ?, ?, ?)",
		id, batch.ID.String(), batch.Author, string(batch.Record), s.Now().UnixMilli(), string(stored))
	return err
}

func insertEntry(g *group, id ID, batch uuid.UUID, entry schematic.Entry) error {
	change, err := json.Marshal(entry.Change)
	if err != nil {
		return err
	}
	target := sql.NullInt64{Int64: int64(entry.Of), Valid: entry.Do != edited}
	_, err = g.Exec(`INSERT INTO log (sheet, revision, batch, author, act, target, change, format)
		VALUES (?, ?, ?, ?, ?, ?, ?, ?)`,
		id, entry.Revision, batch.String(), entry.Author, entry.Do, target, string(change), schematic.Format)
	return err
}

func setRevision(g *group, id ID, revision int) error {
	_, err := g.Exec("UPDATE sheets SET revision = ? WHERE id = ?", revision, id)
	return err
}

// Changes lists what happened to a sheet after a revision, in order.
func (s *Store) Changes(ctx context.Context, id ID, since int) ([]schematic.Entry, error) {
	return entriesOf(s.reads.QueryContext(ctx, `SELECT revision, author, act, target, change FROM log
		WHERE sheet = ? AND revision > ? ORDER BY revision`, id, since))
}

// entriesOf reads the entries of a query for revision, author, act, target and change.
func entriesOf(rows *sql.Rows, err error) ([]schematic.Entry, error) {
	if err != nil {
		return nil, fmt.Errorf("reading the log: %w", err)
	}
	defer rows.Close()
	var entries []schematic.Entry
	for rows.Next() {
		var entry schematic.Entry
		var target sql.NullInt64
		var change []byte
		if err := rows.Scan(&entry.Revision, &entry.Author, &entry.Do, &target, &change); err != nil {
			return nil, fmt.Errorf("reading the log: %w", err)
		}
		entry.Of = int(target.Int64)
		entry.Change = new(schematic.Change)
		if err := json.Unmarshal(change, entry.Change); err != nil {
			return nil, fmt.Errorf("reading revision %d from the log: %w", entry.Revision, err)
		}
		entries = append(entries, entry)
	}
	return entries, rows.Err()
}
