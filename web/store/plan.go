package store

import (
	"context"
	"fmt"
	"slices"

	"loopwright/schematic"
)

// What an entry of the log did.
const (
	edited = "edit"
	undone = "undo"
	redone = "redo"
)

// reach is how many of an author's log entries undo and redo look back on.
const reach = 1000

// plan is what a batch makes of a sheet, as far as it has been taken.
type plan struct {
	sheet    *schematic.Sheet
	revision int
	made     schematic.Made
	entries  []schematic.Entry
	tail     []schematic.Entry // the author's last entries; nil as long as nobody needs them
}

// tail gives the last log entries of a batch's author when they are in memory or the batch reverts something.
func (s *state) tail(from querier, id ID, batch Batch) ([]schematic.Entry, error) {
	tail, known := s.tails[batch.Author]
	if known || !slices.ContainsFunc(batch.Edits, reverts) {
		return tail, nil
	}
	tail, err := entriesOf(from.QueryContext(context.Background(), `SELECT revision, author, act, target, change FROM
		(SELECT * FROM log WHERE sheet = ? AND author = ? ORDER BY revision DESC LIMIT ?) ORDER BY revision`,
		id, batch.Author, reach))
	if tail == nil {
		tail = []schematic.Entry{}
	}
	return tail, err
}

func reverts(edit schematic.Edit) bool { return edit.Do == undone || edit.Do == redone }

// take adds a batch to the plan. An error leaves the plan of no use.
func (p *plan) take(batch Batch) error {
	if batch.Base > p.revision {
		return &schematic.ConflictError{Message: fmt.Sprintf(
			"the edit was made on revision %d, but the sheet is at revision %d; load it again", batch.Base, p.revision)}
	}
	for rest := batch.Edits; len(rest) > 0; {
		var err error
		if reverts(rest[0]) {
			err = p.revert(batch.Author, rest[0].Do)
			rest = rest[1:]
		} else {
			run := slices.IndexFunc(rest, reverts)
			if run < 0 {
				run = len(rest)
			}
			err = p.edit(batch.Author, rest[:run])
			rest = rest[run:]
		}
		if err != nil {
			return err
		}
	}
	return bounded(p.sheet)
}

func (p *plan) edit(author string, edits []schematic.Edit) error {
	sheet, change, made, err := schematic.Apply(p.sheet, edits)
	if err != nil {
		return err
	}
	p.made.Refs = append(p.made.Refs, made.Refs...)
	p.made.Wires = append(p.made.Wires, made.Wires...)
	p.made.Joined = append(p.made.Joined, made.Joined...)
	p.enter(sheet, schematic.Entry{Author: author, Do: edited, Change: change})
	return nil
}

func (p *plan) revert(author, do string) error {
	back := schematic.Undo
	if do == redone {
		back = schematic.Redo
	}
	sheet, change, of, err := back(p.sheet, p.tail, author)
	if err != nil {
		return err
	}
	p.enter(sheet, schematic.Entry{Author: author, Do: do, Of: of, Change: change})
	return nil
}

// enter makes a revision of a change, unless it is empty.
func (p *plan) enter(sheet *schematic.Sheet, entry schematic.Entry) {
	if entry.Change.Empty() {
		return
	}
	p.sheet = sheet
	p.revision++
	entry.Revision = p.revision
	p.entries = append(p.entries, entry)
	if p.tail != nil {
		p.tail = append(p.tail[max(0, len(p.tail)+1-reach):len(p.tail):len(p.tail)], entry)
	}
}
