package store

import (
	"context"
	"database/sql"
	"encoding/json"
	"errors"
	"fmt"

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
	Revision int  `json:"revision"`
	Made     Made `json:"made"`
}

// Made tells what a batch brought about beside what it said; see schematic.Made. No list is nil.
type Made struct {
	Refs   []string `json:"refs"`
	Wires  []string `json:"wires"`
	Joined []string `json:"joined"`
}

// Commit applies a batch and returns once it is durable. A batch that has been accepted before changes nothing and gives
// the same answer. A refused batch leaves no trace: *schematic.ConflictError says that the sheet is no longer what the
// edits suppose, and its answer holds the newest revision; *schematic.PlaceError says that they make no sense. Each
// undo, each redo, and each run of edits between them makes a revision, unless it changes nothing.
func (s *Store) Commit(ctx context.Context, id ID, batch Batch) (Answer, error) {
	for {
		answer, err := s.tryCommit(ctx, id, batch)
		if !errors.Is(err, errMoved) {
			return answer, err
		}
	}
}

// errMoved says that a sheet has got another revision since a batch was planned for it.
var errMoved = errors.New("the sheet has moved on")

// tryCommit plans a batch for the newest revision, which can take long and need not hold up anybody, and has it written.
func (s *Store) tryCommit(ctx context.Context, id ID, batch Batch) (Answer, error) {
	current, err := s.newest(ctx, s.reads, id)
	if err != nil {
		return Answer{}, err
	}
	next, err := current.plan(ctx, s.reads, id, batch)
	if r := (refused{}); errors.As(err, &r) {
		// What was accepted before may be impossible by now: its part is there already.
		if answer, err := s.answered(ctx, id, batch.ID); !errors.Is(err, sql.ErrNoRows) {
			return answer, err
		}
		return Answer{Revision: current.revision}, r.error
	}
	if err != nil {
		return Answer{}, err
	}
	var answer Answer
	err = s.do(ctx, func(g *group) error {
		var err error
		answer, err = s.apply(g, id, batch, next)
		return err
	})
	if err != nil && ctx.Err() != nil {
		return Answer{}, err // the writer may still be at it
	}
	return answer, err
}

// quick is up to which weight of its sheet, times its edits, a batch is planned by the writer itself when another came
// before it. A longer one goes back, so that the writer is free for others.
const quick = 2_000

// apply writes a batch, planned anew when the sheet has another revision than it was planned for.
func (s *Store) apply(g *group, id ID, batch Batch, next *plan) (Answer, error) {
	var stored []byte
	err := g.queryRow("SELECT answer FROM batches WHERE sheet = ? AND id = ?", []any{id, batch.ID.String()}, &stored)
	if !errors.Is(err, sql.ErrNoRows) {
		return readAnswer(stored, err)
	}
	current := g.states[id]
	if current == nil {
		if current, err = s.newest(context.Background(), g, id); err != nil {
			return Answer{}, err
		}
	}
	if current.revision != next.base {
		if current.weight()*len(batch.Edits) > quick {
			return Answer{}, refused{errMoved}
		}
		if next, err = current.plan(context.Background(), g, id, batch); err != nil {
			return Answer{Revision: current.revision}, err
		}
	}
	answer := Answer{Revision: next.revision, Made: next.made}
	return answer, s.insertPlan(g, id, batch, next, answer)
}

// insertPlan writes what a batch makes of a sheet.
func (s *Store) insertPlan(g *group, id ID, batch Batch, next *plan, answer Answer) error {
	if err := s.insertBatch(g, id, batch, answer); err != nil {
		return err
	}
	for _, entry := range next.entries {
		if err := insertEntry(g, id, batch.ID, entry); err != nil {
			return err
		}
	}
	if next.revision == next.base {
		return nil
	}
	if next.revision/between > next.base/between {
		if err := insertSnapshot(g, id, next.revision, schematic.Encode(next.sheet)); err != nil {
			return err
		}
	}
	g.states[id] = next.state(batch.Author)
	g.after = append(g.after, func() { s.notices.tell(id, next.revision) })
	_, err := g.exec("UPDATE sheets SET revision = ? WHERE id = ?", next.revision, id)
	return err
}

// answered gives the answer of a batch that has been accepted before; else sql.ErrNoRows.
func (s *Store) answered(ctx context.Context, id ID, batch uuid.UUID) (Answer, error) {
	var stored []byte
	err := s.reads.QueryRowContext(ctx, "SELECT answer FROM batches WHERE sheet = ? AND id = ?", id, batch.String()).Scan(&stored)
	return readAnswer(stored, err)
}

func readAnswer(stored []byte, err error) (answer Answer, _ error) {
	if err != nil {
		return Answer{}, err
	}
	return answer, json.Unmarshal(stored, &answer)
}

func (s *Store) insertBatch(g *group, id ID, batch Batch, answer Answer) error {
	stored, err := json.Marshal(answer)
	if err != nil {
		return err
	}
	_, err = g.exec("INSERT INTO batches (sheet, id, author, edits, at, answer) VALUES (?, ?, ?, ?, ?, ?)",
		id, batch.ID.String(), batch.Author, string(batch.Record), s.Now().UnixMilli(), string(stored))
	return err
}

func insertEntry(g *group, id ID, batch uuid.UUID, entry schematic.Entry) error {
	change, err := json.Marshal(entry.Change)
	if err != nil {
		return err
	}
	target := sql.NullInt64{Int64: int64(entry.Of), Valid: entry.Do != edited}
	_, err = g.exec(`INSERT INTO log (sheet, revision, batch, author, act, target, change, format)
		VALUES (?, ?, ?, ?, ?, ?, ?, ?)`,
		id, entry.Revision, batch.String(), entry.Author, entry.Do, target, string(change), schematic.Format)
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
