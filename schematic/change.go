package schematic

import (
	"bytes"
	"fmt"
	"maps"
	"slices"
)

// Change is what a batch of edits did to a sheet: each part, wire, joint, case and field of the title block that it
// touched, as it was before and as it was after. A log of Changes gives every earlier sheet again, whatever later
// versions do with edits. The zero Change changes nothing.
type Change struct {
	Parts  []Touched `json:"parts,omitempty"`
	Wires  []Touched `json:"wires,omitempty"`
	Joints []Touched `json:"joints,omitempty"` // named "x,y"
	Cases  []Touched `json:"cases,omitempty"`
	Head   []Touched `json:"head,omitempty"` // fields of the title block and of the settings; From and To do not count
}

// Touched is one thing before and after a change, written as in a sheet file. Before is empty for what was added, After
// for what was removed. The indices say where in its list it stood, and are −1 where it did not.
type Touched struct {
	Name   string `json:"name"`
	From   int    `json:"from"`
	To     int    `json:"to"`
	Before string `json:"before,omitempty"`
	After  string `json:"after,omitempty"`
	// Moved marks what has changed its place among the things before and after it.
	Moved bool `json:"moved,omitempty"`
}

// Empty reports whether nothing was changed.
func (c *Change) Empty() bool {
	return len(c.Parts)+len(c.Wires)+len(c.Joints)+len(c.Cases)+len(c.Head) == 0
}

// Inverse is the change that takes this one back.
func (c *Change) Inverse() *Change {
	return &Change{invert(c.Parts), invert(c.Wires), invert(c.Joints), invert(c.Cases), invert(c.Head)}
}

func invert(list []Touched) []Touched {
	var inverse []Touched
	for _, t := range list {
		inverse = append(inverse, Touched{t.Name, t.To, t.From, t.After, t.Before, t.Moved})
	}
	return inverse
}

// named says how the things of one list are named, written and compared.
type named[T any] struct {
	name func(*T) string
	text func([]byte, *T) []byte
	read func(value any, place string) (T, error)
	same func(a, b *T) bool // whether two things of one name are written alike
}

var (
	namedParts = named[Part]{
		func(p *Part) string { return p.Ref }, appendPart,
		func(value any, place string) (Part, error) { return readPart(value, place, true) }, samePart,
	}
	namedWires = named[Wire]{
		func(w *Wire) string { return w.ID }, appendWire, readWire,
		func(a, b *Wire) bool { return slices.Equal(a.Points, b.Points) },
	}
	namedJoints = named[Point]{
		func(p *Point) string { return fmt.Sprintf("%d,%d", p.X, p.Y) },
		func(out []byte, p *Point) []byte { return appendPoint(out, *p) }, readPoint,
		func(a, b *Point) bool { return *a == *b },
	}
	namedCases = named[Case]{
		func(c *Case) string { return c.Name }, appendCase, readCase, sameCase,
	}
)

// Compare finds what changed from one sheet to another. A thing is the same when it has the same name; a renamed part
// is one part removed and another added. Its cost is linear in the sheets, and what no edit has touched is not written.
func Compare(before, after *Sheet) *Change {
	c := &Change{
		Parts:  compareLists(before.Parts, after.Parts, namedParts),
		Wires:  compareLists(before.Wires, after.Wires, namedWires),
		Joints: compareLists(before.Joints, after.Joints, namedJoints),
		Cases:  compareLists(before.Cases, after.Cases, namedCases),
	}
	for _, row := range headRows() {
		for _, name := range row {
			was, is := headField(before, name), headField(after, name)
			if !bytes.Equal(was, is) {
				c.Head = append(c.Head, Touched{Name: name, Before: string(was), After: string(is)})
			}
		}
	}
	return c
}

func samePart(a, b *Part) bool {
	if a.Ref != b.Ref || a.Kind != b.Kind || a.At != b.At || a.Turn != b.Turn || a.Flip != b.Flip || len(a.Values) != len(b.Values) {
		return false
	}
	if (a.Label == nil) != (b.Label == nil) || (a.Label != nil && *a.Label != *b.Label) {
		return false
	}
	for name, value := range a.Values {
		other, given := b.Values[name]
		if !given || value.Written != other.Written || !value.Same(other) {
			return false
		}
	}
	return true
}

func compareLists[T any](old, now []T, how named[T]) []Touched {
	same := func(a, b *T) bool { return how.name(a) == how.name(b) && how.same(a, b) }
	// Most edits leave the beginning and the end of each list as they were.
	start, behind := 0, 0
	for start < min(len(old), len(now)) && same(&old[start], &now[start]) {
		start++
	}
	for behind < min(len(old), len(now))-start && same(&old[len(old)-1-behind], &now[len(now)-1-behind]) {
		behind++
	}
	at := make(map[string]int, len(old)-start-behind)
	for i := start; i < len(old)-behind; i++ {
		at[how.name(&old[i])] = i
	}
	var list []Touched
	last := -1 // the furthest place in the old list of those that have stood
	for k := start; k < len(now)-behind; k++ {
		name := how.name(&now[k])
		i, known := at[name]
		if !known {
			list = append(list, Touched{Name: name, From: -1, To: k, After: string(how.text(nil, &now[k]))})
			continue
		}
		delete(at, name)
		moved := i < last
		last = max(last, i)
		if moved || !how.same(&old[i], &now[k]) {
			list = append(list, Touched{name, i, k, string(how.text(nil, &old[i])), string(how.text(nil, &now[k])), moved})
		}
	}
	for i := start; i < len(old)-behind; i++ {
		name := how.name(&old[i])
		if _, gone := at[name]; gone {
			list = append(list, Touched{Name: name, From: i, To: -1, Before: string(how.text(nil, &old[i]))})
		}
	}
	return list
}

func sameCase(a, b *Case) bool {
	return a.Follows == b.Follows && a.Supply == b.Supply && maps.Equal(a.Positions, b.Positions) && maps.Equal(a.Timers, b.Timers)
}
