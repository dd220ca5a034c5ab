// Package stroke is the display list: what a drawing is made of once nobody needs to know any more what it means.
//
// Coordinates and lengths are in grid steps, x to the right, y down; one grid step is 5 mm on paper. Angles are in
// degrees, clockwise as seen on the sheet, from the positive x direction. A list is drawn once and written as SVG and
// as PDF alike.
package stroke

// Step is the length of one grid step on paper, in millimetres.
const Step = 5.0

// Point is a place on the sheet, in grid steps.
type Point struct{ X, Y float64 }

// Ink is what a shape is drawn with. Its meaning is fixed: black is drawn by people, blue is computed, red is review,
// yellow is verified at the bench, grey is what the form has printed on it, and faint is the ruling of the paper.
type Ink uint8

// The inks of the drafting table.
const (
	Black Ink = iota
	Blue
	Red
	Yellow
	Faint
	Paper // the colour of the sheet itself, to keep what lies below from showing through
	Grey
)

// Weight is the width of a line, from the series of ISO 128-2.
type Weight uint8

// The widths: 0.35, 0.25, 0.5 and 0.7 mm, which is the line group 0.7 with the step between its two. Normal is the zero
// value.
const (
	Normal Weight = iota
	Fine
	Medium
	Heavy
)

// Millimetres is the width of the line on paper.
func (w Weight) Millimetres() float64 {
	return [...]float64{0.35, 0.25, 0.5, 0.7}[w]
}

// Style is how the outline of a shape is drawn and whether its inside is filled.
type Style struct {
	Ink    Ink
	Weight Weight
	Dashed bool
	Filled bool // the inside takes the ink; the outline is drawn as well
	Opaque bool // the inside takes the colour of the paper
}

// Shape is one of Path, Circle, Arc and Text.
type Shape interface{ shape() }

// Path is a line through points, closed back to the first when Closed is set.
type Path struct {
	Points []Point
	Closed bool
	Style
}

// Circle is a full circle.
type Circle struct {
	Center Point
	Radius float64
	Style
}

// Arc is a part of a circle that begins at the angle Start and goes on for Sweep degrees, clockwise when positive.
type Arc struct {
	Center       Point
	Radius       float64
	Start, Sweep float64
	Style
}

// Anchor says which point of a text's line lies at its place.
type Anchor uint8

// The anchors of a text.
const (
	Start Anchor = iota
	Middle
	End
)

// Text is one line of lettering. It is always set level, whatever the part it belongs to is turned to.
type Text struct {
	At     Point // on the baseline, or on the middle of the capitals when Centred is set
	Text   string
	Height float64 // of the type (its em), in grid steps
	Anchor Anchor
	// Centred puts the middle of the capital letters at At, rather than the baseline.
	Centred bool
	Bold    bool
	Italic  bool
	Ink     Ink
}

func (Path) shape()   {}
func (Circle) shape() {}
func (Arc) shape()    {}
func (Text) shape()   {}

// List is a drawing: its shapes in the order in which they are drawn.
type List []Shape

// Line is an open path of normal weight in black ink through the points given as x, y, x, y …
func Line(coordinates ...float64) Path { return Path{Points: points(coordinates)} }

// Outline is a closed path of normal weight in black ink through the points given as x, y, x, y …
func Outline(coordinates ...float64) Path {
	return Path{Points: points(coordinates), Closed: true}
}

// Rectangle is the closed outline between two opposite corners.
func Rectangle(left, top, right, bottom float64) Path {
	return Outline(left, top, right, top, right, bottom, left, bottom)
}

func points(coordinates []float64) []Point {
	list := make([]Point, len(coordinates)/2)
	for i := range list {
		list[i] = Point{coordinates[2*i], coordinates[2*i+1]}
	}
	return list
}
