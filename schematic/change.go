package schematic

import (
	"bytes"
	"slices"
)

// Change is what a batch of edits did to a sheet: each part, wire and case that it touched, as it was before and as it
// was after. A log of Changes gives every earlier sheet again, whatever later versions do with edits. The zero Change
// changes nothing.
type Change struct {
	Parts  []Touched `json:"parts,omitempty"`
	Wires  []Touched `json:"wires,omitempty"`
	Cases  []Touched `json:"cases,omitempty"`
	Head   *Touched  `json:"head,omitempty"` // the title block and settings
	Joints *Touched  `json:"joints,omitempty"`
	Order  *Touched  `json:"order,omitempty"` // the names of all cases, when those that stayed stand in another order
}

// Touched is one thing before and after a change, written as in a sheet file. Before is empty for what was added, After
// for what was removed. The indices say where in its list it stood.
type Touched struct {
	Name   string `json:"name,omitempty"`
	From   int    `json:"from"`
	To     int    `json:"to"`
	Before string `json:"before,omitempty"`
	After  string `json:"after,omitempty"`
}

// Empty reports whether nothing was changed.
func (c *Change) Empty() bool {
	return len(c.Parts)+len(c.Wires)+len(c.Cases) == 0 && c.Head == nil && c.Joints == nil && c.Order == nil
}

// Inverse is the change that takes this one back.
func (c *Change) Inverse() *Change {
	return &Change{invertAll(c.Parts), invertAll(c.Wires), invertAll(c.Cases), invert(c.Head), invert(c.Joints), invert(c.Order)}
}

func invertAll(list []Touched) []Touched {
	var inverse []Touched
	for i := range list {
		inverse = append(inverse, *invert(&list[i]))
	}
	return inverse
}

func invert(t *Touched) *Touched {
	if t == nil {
		return nil
	}
	return &Touched{t.Name, t.To, t.From, t.After, t.Before}
}

// named says how the things of one list are named, written and compared.
type named[T any] struct {
	name func(*T) string
	text func([]byte, *T) []byte
	read func(value any, place string) (T, error)
	same func(a, b *T) bool // a quick test for things that no edit has touched; it may say no to equal ones
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
	namedCases = named[Case]{
		func(c *Case) string { return c.Name }, appendCase, readCase,
		func(*Case, *Case) bool { return false },
	}
)

// Compare finds what changed from one sheet to another. A thing is the same when it has the same name; a renamed part
// is one part removed and another added.
func Compare(before, after *Sheet) *Change {
	c := &Change{
		Parts:  compareLists(before.Parts, after.Parts, namedParts),
		Wires:  compareLists(before.Wires, after.Wires, namedWires),
		Cases:  compareLists(before.Cases, after.Cases, namedCases),
		Head:   touchedText(appendHeadObject(before), appendHeadObject(after)),
		Joints: touchedText(appendPoints(nil, before.Joints), appendPoints(nil, after.Joints)),
	}
	if reordered(before.Cases, after.Cases) {
		c.Order = touchedText(appendTexts(nil, caseNames(before.Cases)), appendTexts(nil, caseNames(after.Cases)))
	}
	return c
}

// appendHeadObject writes the title block and settings as an object of their own.
func appendHeadObject(sheet *Sheet) []byte {
	return append(appendHead([]byte{'{'}, sheet), '}')
}

// samePart is a quick test for parts that no edit has touched.
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
	at := make(map[string]int, len(old))
	for i := range old {
		at[how.name(&old[i])] = i
	}
	var list []Touched
	for k := range now {
		name := how.name(&now[k])
		i, known := at[name]
		delete(at, name)
		switch {
		case !known:
			list = append(list, Touched{Name: name, From: -1, To: k, After: string(how.text(nil, &now[k]))})
		case !how.same(&old[i], &now[k]):
			before, after := how.text(nil, &old[i]), how.text(nil, &now[k])
			if !bytes.Equal(before, after) {
				list = append(list, Touched{name, i, k, string(before), string(after)})
			}
		}
	}
	for i := range old {
		name := how.name(&old[i])
		if _, gone := at[name]; gone {
			list = append(list, Touched{Name: name, From: i, To: -1, Before: string(how.text(nil, &old[i]))})
		}
	}
	return list
}

func touchedText(before, after []byte) *Touched {
	if bytes.Equal(before, after) {
		return nil
	}
	return &Touched{Before: string(before), After: string(after)}
}

func caseNames(cases []Case) []string {
	names := make([]string, len(cases))
	for i := range cases {
		names[i] = cases[i].Name
	}
	return names
}

// reordered reports whether the cases that are in both lists stand in another order.
func reordered(before, after []Case) bool {
	a, b := caseNames(before), caseNames(after)
	a = slices.DeleteFunc(a, func(name string) bool { return !slices.Contains(b, name) })
	b = slices.DeleteFunc(b, func(name string) bool { return !slices.Contains(a, name) })
	return !slices.Equal(a, b)
}
