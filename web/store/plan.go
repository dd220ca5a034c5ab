package store

import (
	"context"
	"errors"
	"fmt"
	"slices"
	"strconv"
	"strings"

	"loopwright/schematic"
)

// What an entry of the log did.
const (
	edited = "edit"
	undone = "undo"
	redone = "redo"
)

// reach is how many of an author's log entries undo and redo look back on, at least.
const reach = 1000

// mostEdits is how many edits a batch may have; applying one takes time that grows with the sheet.
const mostEdits = 1_000

// plan is what a batch makes of a sheet.
type plan struct {
	base     int // the revision that it was planned for
	sheet    *schematic.Sheet
	revision int
	made     Made
	entries  []schematic.Entry
	tails    map[string][]schematic.Entry // of all authors, before the batch
	tail     []schematic.Entry            // of the author, with the batch; nil as long as nobody needs it
}

// plan works out what a batch makes of a state. What makes no sense is an error of type refused.
func (s *state) plan(ctx context.Context, from querier, id ID, batch Batch) (*plan, error) {
	next := &plan{base: s.revision, sheet: s.sheet, revision: s.revision, tails: s.tails, tail: slices.Clip(s.tails[batch.Author]),
		made: Made{Refs: []string{}, Wires: []string{}, Joined: []string{}}}
	if next.tail == nil && slices.ContainsFunc(batch.Edits, reverts) {
		tail, err := tailOf(ctx, from, id, batch.Author, s.revision)
		if err != nil {
			return nil, err
		}
		next.tail = append([]schematic.Entry{}, tail...)
	}
	if err := next.take(batch); err != nil {
		return nil, refused{err}
	}
	return next, nil
}

// tailOf reads the last log entries of an author, up to a revision.
func tailOf(ctx context.Context, from querier, id ID, author string, revision int) ([]schematic.Entry, error) {
	return entriesOf(from.QueryContext(ctx, `SELECT revision, author, act, target, change FROM
		(SELECT * FROM log WHERE sheet = ? AND author = ? AND revision <= ? ORDER BY revision DESC LIMIT ?) ORDER BY revision`,
		id, author, revision, reach))
}

// state is the sheet after the batch of an author.
func (p *plan) state(author string) *state {
	next := &state{sheet: p.sheet, revision: p.revision, tails: p.tails}
	if p.tail != nil {
		next.tails = map[string][]schematic.Entry{author: p.tail}
		for other, tail := range p.tails {
			if other != author {
				next.tails[other] = tail
			}
		}
	}
	return next
}

func reverts(edit schematic.Edit) bool { return edit.Do == undone || edit.Do == redone }

// take adds a batch to the plan. An error leaves the plan of no use.
func (p *plan) take(batch Batch) error {
	if len(batch.Edits) > mostEdits {
		return &schematic.PlaceError{Place: "edits", Message: fmt.Sprintf(
			"a batch has at most %d edits, this one has %d; divide it into several", mostEdits, len(batch.Edits))}
	}
	if batch.Base > p.revision {
		return &schematic.ConflictError{Message: fmt.Sprintf(
			"the edit was made on revision %d, but the sheet is at revision %d; load it again", batch.Base, p.revision)}
	}
	for start, end := 0, 0; start < len(batch.Edits); start = end {
		first := batch.Edits[start]
		if reverts(first) {
			end = start + 1
			if err := p.revert(batch.Author, first.Do); err != nil {
				return err
			}
			continue
		}
		end = len(batch.Edits)
		if run := slices.IndexFunc(batch.Edits[start:], reverts); run >= 0 {
			end = start + run
		}
		if err := p.edit(batch.Author, batch.Edits[start:end]); err != nil {
			return shifted(err, start)
		}
	}
	return bounded(p.sheet)
}

// shifted counts the place of an error, "edits[2].part", from the beginning of the batch: the edits of a run count from
// its own.
func shifted(err error, start int) error {
	var place *schematic.PlaceError
	if !errors.As(err, &place) {
		return err
	}
	number, rest, found := strings.Cut(strings.TrimPrefix(place.Place, "edits["), "]")
	index, malformed := strconv.Atoi(number)
	if !found || malformed != nil {
		return err
	}
	return &schematic.PlaceError{Place: fmt.Sprintf("edits[%d]%s", start+index, rest), Message: place.Message}
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
		if len(p.tail) >= 2*reach {
			p.tail = slices.Clone(p.tail[len(p.tail)-reach:])
		}
		p.tail = append(p.tail, entry)
	}
}
