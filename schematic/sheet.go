// Package schematic holds the sheet: one drawing with its title block, its parts, wires and cases. Everything in it is
// a pure value; an edit takes a sheet and gives another together with what changed.
//
// Places are whole grid steps, x to the right and y down; turns are quarter turns, clockwise as seen on the sheet.
package schematic

import (
	"loopwright/schematic/kinds"
)

// Format is the name of the sheet format that this package reads and writes.
const Format = "loopwright-sheet/1"

// Point is a place on the grid.
type Point struct{ X, Y int }

// Sheet is one drawing. The zero Sheet is an empty DC sheet of size A4 that has no title.
type Sheet struct {
	Title, Number, Owner, Author string
	System                       kinds.System
	Symbols                      kinds.SymbolSet
	Size                         string // "A4" … "A1", "A" … "D"
	// Reference names the potential of 0 V: a potential's name, a "REF:pin", or empty for the second pin of the first source.
	// A name that nothing on the sheet bears is kept, for somebody may draw it yet, and means the same as an empty one.
	Reference string
	Parts     []Part
	Wires     []Wire
	Joints    []Point // crossings that are joined
	Cases     []Case  // never empty in a decoded sheet
}

// Part is one component on the sheet.
type Part struct {
	Ref    string // unique on the sheet, without the leading hyphen: "K1", "K1:2"
	Kind   *kinds.Kind
	At     Point
	Turn   int  // 0, 90, 180 or 270
	Flip   bool // mirrored left-right before turning
	Values kinds.Values
	Label  *Point // where a person has put its lettering, from the part's origin; nil leaves it to the placer
}

// Wire is a drawn conductor of no resistance: a chain of horizontal and vertical segments.
type Wire struct {
	ID     string
	Points []Point // at least two; each segment has a length
}

// Case is one operating case.
type Case struct {
	Name      string
	Follows   string            // the case whose coil states it starts from; empty for none
	Supply    kinds.Level       // never empty in a decoded sheet
	Positions map[string]string // by reference; what is not named is at rest; nil when none is named
	Timers    map[string]string // by reference: "running" or "elapsed"
}

// Fill gives the part's values with the defaults of its kind.
func (p *Part) Fill() kinds.Filled { return p.Kind.Fill(p.Values) }

// Pin is where a pin of the part lies on the sheet.
func (p *Part) Pin(pin kinds.Pin) Point { return p.place(pin.X, pin.Y) }

// pin is where the pin with an index in Kind.Pins lies on the sheet.
func (p *Part) pin(k int) Point { return p.place(p.Kind.Pins[k].X, p.Kind.Pins[k].Y) }

// place is where an offset from the part's origin lies on the sheet.
func (p *Part) place(x, y int) Point {
	if p.Flip {
		x = -x
	}
	switch p.Turn {
	case 90:
		x, y = -y, x
	case 180:
		x, y = -x, -y
	case 270:
		x, y = y, -x
	}
	return Point{p.At.X + x, p.At.Y + y}
}

// Part finds a part by its reference; nil when there is none.
func (s *Sheet) Part(ref string) *Part {
	for i := range s.Parts {
		if s.Parts[i].Ref == ref {
			return &s.Parts[i]
		}
	}
	return nil
}

// Wire finds a wire by its name; nil when there is none.
func (s *Sheet) Wire(id string) *Wire {
	for i := range s.Wires {
		if s.Wires[i].ID == id {
			return &s.Wires[i]
		}
	}
	return nil
}

// Case finds a case by its name and gives its index; −1 when there is none.
func (s *Sheet) Case(name string) int {
	for i := range s.Cases {
		if s.Cases[i].Name == name {
			return i
		}
	}
	return -1
}

// Position is where a part stands in a case: the named position, or rest, the first position of its kind.
func (c *Case) Position(part *Part) string {
	if position, ok := c.Positions[part.Ref]; ok {
		return position
	}
	return part.rest()
}

// rest is the position of a part that no case names: the first one of its kind.
func (p *Part) rest() string {
	if p.Kind.Positions == nil {
		return kinds.Rest
	}
	return p.Kind.Positions(p.Fill())[0]
}

// byRef finds parts by their references.
func (s *Sheet) byRef() map[string]*Part {
	parts := make(map[string]*Part, len(s.Parts))
	for i := range s.Parts {
		parts[s.Parts[i].Ref] = &s.Parts[i]
	}
	return parts
}
