// Package draw lays a sheet and its solution out as a drawing and writes it as SVG: frame and title block, wires,
// symbols, lettering that covers nothing, values in blue, and the arrows of the mesh currents.
//
// Places in a Picture are grid steps, as in package stroke; the SVG has 20 user units to a step, which is 4 to a
// millimetre.
package draw

import (
	"loopwright/schematic/kinds"
	"loopwright/schematic/stroke"
)

// Unit is the number of SVG user units per grid step.
const Unit = 20.0

// perMillimetre is the number of SVG user units per millimetre of paper.
const perMillimetre = Unit / stroke.Step

// Options says what of a solution is drawn, and for whom.
type Options struct {
	Case        int  // index of the shown case; it must be one of the result's
	Meshes      bool // whether the mesh currents have their arrows
	Interactive bool // whether the drawing is to be worked on: grid, handles, names for screen readers
	// Date, Revision and Checked are written into the title block as they are; an empty Revision is a draft.
	Date, Revision, Checked string
}

// Picture is a drawing on its paper.
type Picture struct {
	Title            string
	Size             string  // of the paper: "A4"
	Width, Height    float64 // of the paper, in millimetres
	OriginX, OriginY float64 // where grid point (0, 0) lies, in millimetres from the upper left corner of the paper
	Interactive      bool
	Groups           []Group // from the lowest to the uppermost layer
}

// The layers of a drawing, from the lowest to the uppermost.
const (
	PaperLayer = "paper"
	MeshLayer  = "meshes"
	WireLayer  = "wires"
	JoinLayer  = "joins"
	PartLayer  = "parts"
	MarkLayer  = "marks"
)

var layers = [...]string{PaperLayer, MeshLayer, WireLayer, JoinLayer, PartLayer, MarkLayer}

// Group is one thing of a drawing, which can be exchanged on its own.
type Group struct {
	ID         string // unique in the drawing, without spaces
	Layer      string
	Attributes []Attribute
	List       stroke.List
	Ruling     *stroke.Box // filled with the dots of the grid
	Hit        *stroke.Box // where a pointer meets the group beside its lines
	Handles    []Handle    // the pins
	Along      []stroke.Point
}

// Attribute is one attribute of an SVG element, not escaped.
type Attribute struct{ Name, Value string }

// Handle is a pin that a pointer can take hold of.
type Handle struct {
	Name string // "K1:A1"
	At   stroke.Point
}

// SymbolSVG is a small picture of a kind for the tray: its symbol at rest about the origin, in the units of the
// drawing. What assistive technology reads stands beside it, so it is hidden from that.
func SymbolSVG(kind *kinds.Kind, values kinds.Values, set kinds.SymbolSet) string {
	look := kinds.Look{Values: kind.Fill(values), Set: set, Position: kinds.Rest, Closed: true}
	if kind.Positions != nil {
		look.Position = kind.Positions(look.Values)[0]
		look.Closed = kind.Closed(look.Values, look.Position)
	}
	list := kind.Symbol(look)
	box, _ := list.Bounds()
	// Every symbol is shown at the same scale as far as it fits, so that the tray looks like the sheet.
	center := stroke.Point{X: (box.Left + box.Right) / 2, Y: (box.Top + box.Bottom) / 2}
	half := max(box.Right-center.X, box.Bottom-center.Y, smallest) + 0.15
	w := writer{}
	w.text(`<svg viewBox="`)
	w.units(center.X - half)
	w.text(" ")
	w.units(center.Y - half)
	w.text(" ")
	w.units(2 * half)
	w.text(" ")
	w.units(2 * half)
	w.text(`" aria-hidden="true" ` + lineDefaults + ` font-family="` + fontFamily + `">`)
	w.list(list)
	w.text("</svg>")
	return string(w.out)
}

// smallest is half the side of the smallest square that a symbol in the tray is shown in, in grid steps.
const smallest = 1.9
