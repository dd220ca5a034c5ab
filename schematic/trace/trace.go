// Package trace reads the circuit off a sheet: which pins are one potential, which branches lie between the potentials,
// and along which meshes they are solved.
package trace

import (
	"slices"
	"time"

	"loopwright/schematic"
	"loopwright/schematic/kinds"
	"loopwright/schematic/stroke"
)

// Potential is everything that is joined without resistance.
type Potential struct {
	Number     string   // "0" for the reference, the others "1", "2" … in reading order of their first place
	WireNumber string   // what the ferrule says: it passes unchanged through ammeters and terminals
	Name       string   // what a potential or earth symbol calls it; empty for none
	Pins       []string // "G1:2", in reading order
}

// Branch is one element of the circuit. Branches stand in the order of the parts on the sheet.
type Branch struct {
	Part     int // index in Sheet.Parts
	Ref      string
	Index    int       // within the part
	Pins     [2]string // it runs from the first to the second
	From, To int       // potentials
}

// Step is one branch of a mesh: Sense is 1 where the mesh runs from the branch's first pin to its second, else −1.
type Step struct{ Branch, Sense int }

// Mesh is a closed way along branches. A drawn mesh is a face of the drawing and runs clockwise; it begins with its first
// source, in the order of the parts, or at its top left corner when it has none. Any other mesh is a loop. It begins with its
// first source and runs through it the way it delivers, or with its first branch, from the first pin to the second.
type Mesh struct {
	Name    string // "m1", "m2" … the drawn ones first, by their top left corners in reading order, then the loops
	Drawn   bool
	Path    []Step
	Outline []stroke.Point // of a drawn mesh
	Center  stroke.Point   // where a drawn mesh is widest, in grid steps
	Radius  float64        // of the largest circle around Center that no line cuts, in grid steps
}

// Statement says what is not joined to what one would expect.
type Statement struct {
	Rule string // "dangling-end", "open-pin", "floating", "reference" or "two-names"
	Says string
	Refs []string
	Wire string
	At   *schematic.Point
}

// Drawing is a sheet as a circuit. It holds for every case: what a switch does changes the law of its branch and
// nothing here.
type Drawing struct {
	Sheet         *schematic.Sheet
	Joins         *schematic.Joins
	Potentials    []Potential
	Branches      []Branch
	Meshes        []Mesh
	WirePotential []int   // by wire
	PinPotential  [][]int // by part and pin
	Reference     int     // the potential of 0 V
	Statements    []Statement
	Timing        Timing

	places [][]int // by part and pin, in Joins.Places
}

// Timing says how long the stretches of tracing took.
type Timing struct {
	Geometry time.Duration // what is joined, which potentials and branches there are
	Meshes   time.Duration
}

// Trace reads a sheet. Its cost is O(n log n) where the drawing is plane and all circuits are closed on paper; each mesh
// that is not a face of the drawing costs a search through the circuit.
func Trace(sheet *schematic.Sheet) *Drawing {
	start := time.Now()
	d := &Drawing{Sheet: sheet, Joins: schematic.Join(sheet)}
	d.findPlaces()
	d.findPotentials()
	d.findBranches()
	d.numberWires()
	d.state()
	traced := time.Now()
	d.findMeshes()
	d.Timing = Timing{Geometry: traced.Sub(start), Meshes: time.Since(traced)}
	return d
}

// resting is a condition under which every kind gives its branches; which they are does not depend on it.
func resting(sheet *schematic.Sheet, part *schematic.Part) kinds.Condition {
	condition := kinds.Condition{System: sheet.System, Supply: kinds.Nominal, Position: kinds.Rest}
	if part.Kind.Positions != nil {
		condition.Position = part.Kind.Positions(part.Fill())[0]
	}
	return condition
}

func (d *Drawing) findPlaces() {
	d.places = make([][]int, len(d.Sheet.Parts))
	for i := range d.Sheet.Parts {
		part := &d.Sheet.Parts[i]
		d.places[i] = make([]int, len(part.Kind.Pins))
		for k, pin := range part.Kind.Pins {
			d.places[i][k] = d.Joins.Node[part.Pin(pin)]
		}
	}
}

func (d *Drawing) findBranches() {
	for i := range d.Sheet.Parts {
		part := &d.Sheet.Parts[i]
		if part.Kind.Branches == nil {
			continue
		}
		for k, branch := range part.Kind.Branches(part.Fill(), resting(d.Sheet, part)) {
			d.Branches = append(d.Branches, Branch{
				Part: i, Ref: part.Ref, Index: k, Pins: [2]string{branch.From, branch.To},
				From: d.PinPotential[i][pinIndex(part.Kind, branch.From)], To: d.PinPotential[i][pinIndex(part.Kind, branch.To)],
			})
		}
	}
}

func pinIndex(kind *kinds.Kind, name string) int {
	return slices.IndexFunc(kind.Pins, func(pin kinds.Pin) bool { return pin.Name == name })
}

// ends are the places of the two pins of a branch.
func (d *Drawing) ends(b int) (from, to int) {
	branch := &d.Branches[b]
	kind := d.Sheet.Parts[branch.Part].Kind
	return d.places[branch.Part][pinIndex(kind, branch.Pins[0])], d.places[branch.Part][pinIndex(kind, branch.Pins[1])]
}
