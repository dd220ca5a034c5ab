package cases

import (
	"strconv"
	"strings"

	"loopwright/schematic/trace"
	"loopwright/solver"
)

// Equation is one equation of the record, with symbols and with numbers of four significant digits, in volts, amperes and
// ohms. Of names the meshes that it is about: one for a mesh, several for a supermesh, those through the branch for the
// constraint of a current source or an open contact.
//
// E is the voltage of a source, R a resistance (Z an impedance in AC), J the current that a source delivers, and i1, i2 …
// are the mesh currents.
type Equation struct {
	Of      []string
	Symbols string // "−E(G1) + R(F1)·i1 + R(P1)·(i1 − i2) = 0"
	Numbers string // "−24 + 0.05·i1 + 288·(i1 − i2) = 0"
}

// equations writes the equations of a solved network: Kirchhoff's voltage law around each mesh or supermesh, and then the
// constraint of each branch that sets its current.
func equations[T solver.Scalar](drawing *trace.Drawing, network *solver.Network[T], solution *solver.Solution[T]) []Equation {
	w := writer[T]{drawing, solution.Laws}
	list := solver.Equations(network, solution)
	written := make([]Equation, len(list))
	for i := range list {
		written[i] = w.equation(&list[i])
	}
	return written
}

// meshCurrents writes the current of each branch in terms of mesh currents: "i1 − i2", "0" for a branch in no mesh.
func meshCurrents(drawing *trace.Drawing) []string {
	sums := make([]expression, len(drawing.Branches))
	for m, mesh := range drawing.Meshes {
		for _, step := range mesh.Path {
			sums[step.Branch].add(step.Sense < 0, currentName(drawing, m))
		}
	}
	texts := make([]string, len(sums))
	for b := range sums {
		texts[b] = sums[b].positiveFirst().text()
	}
	return texts
}

// currentName is the symbol of a mesh current: i1 for the mesh m1.
func currentName(drawing *trace.Drawing, mesh int) string {
	return "i" + strings.TrimPrefix(drawing.Meshes[mesh].Name, "m")
}

// writer writes the equations of one case.
type writer[T solver.Scalar] struct {
	drawing *trace.Drawing
	laws    []solver.Law[T]
}

func (w *writer[T]) equation(e *solver.Equation[T]) Equation {
	out := Equation{Of: make([]string, len(e.Of))}
	for i, m := range e.Of {
		out.Of[i] = w.drawing.Meshes[m].Name
	}
	var symbols, numbers expression
	for i := range e.Terms {
		w.term(&e.Terms[i], &symbols, &numbers)
	}
	right := phasor(e.Right)
	out.Symbols = symbols.text() + " = " + w.right(e)
	out.Numbers = numbers.text() + " = " + number(right)
	return out
}

// term adds one term to an equation, once with symbols and once with numbers.
func (w *writer[T]) term(term *solver.EquationTerm[T], symbols, numbers *expression) {
	value := phasor(term.Value)
	negative := imag(value) == 0 && real(value) < 0
	if negative {
		value = -value
	}
	switch term.Kind {
	case solver.Source:
		w.source(term, symbols)
		numbers.add(negative, number(value))
	case solver.Voltage:
		factor := ""
		if value != 1 {
			factor = number(value) + "·"
		}
		symbols.add(negative, factor+"U("+w.name(term.Of)+")")
		numbers.add(negative, factor+"U("+w.name(term.Of)+")")
	default:
		currents, against := w.currents(term.Meshes)
		factor := number(value)
		letter := factor // how a branch is controlled by another is only told with numbers
		if term.Kind == solver.Drop {
			letter = w.letter() + "(" + w.name(term.Branch) + ")"
		}
		if term.Kind == solver.Current && term.Of == term.Branch {
			symbols.addAll(negative != against, currents)
			numbers.addAll(negative != against, currents)
			return
		}
		symbols.add(negative != against, letter+"·"+currents.factor())
		numbers.add(negative != against, factor+"·"+currents.factor())
	}
}

// source adds the symbol of a source's voltage with the sign in which the way runs through it.
func (w *writer[T]) source(term *solver.EquationTerm[T], symbols *expression) {
	law := &w.laws[term.Branch]
	symbols.add(term.Value != law.Gamma/law.Beta, "E("+w.name(term.Branch)+")")
}

// currents is a sum of mesh currents whose first is positive; against tells that the sign is to be turned.
func (w *writer[T]) currents(meshes []solver.SignedMesh) (sum expression, against bool) {
	for _, m := range meshes {
		name := currentName(w.drawing, m.Mesh)
		if times := max(m.Sign, -m.Sign); times > 1 {
			name = strconv.Itoa(times) + "·" + name
		}
		sum.add(m.Sign < 0, name)
	}
	sum = sum.positiveFirst()
	if against = len(sum) > 0 && sum[0].negative; against {
		for i := range sum {
			sum[i].negative = !sum[i].negative
		}
	}
	return sum, against
}

// right is the right side of an equation with symbols.
func (w *writer[T]) right(e *solver.Equation[T]) string {
	if e.Kind == solver.VoltageLaw {
		return "0"
	}
	name, source := w.name(e.Branch), w.drawing.Sheet.Parts[w.drawing.Branches[e.Branch].Part].Kind.Delivers
	switch {
	case e.Kind == solver.Definition && e.Right != 0:
		return "E(" + name + ")"
	case e.Kind == solver.Constraint && e.Right == 0 && !source:
		return "0 (" + name + " open)"
	case e.Right == 0 && !source:
		return "0"
	}
	current := w.laws[e.Branch].Gamma / w.laws[e.Branch].Alpha
	if (e.Right == current) == source && current != 0 { // what a source delivers leaves it at its first pin
		return "−J(" + name + ")"
	}
	return "J(" + name + ")"
}

// letter is the symbol of what opposes a current.
func (w *writer[T]) letter() string {
	if w.drawing.Sheet.System.AC() {
		return "Z"
	}
	return "R"
}

// name is the reference of a branch's part, with its pins where the part has several branches.
func (w *writer[T]) name(b int) string {
	list, branch := w.drawing.Branches, &w.drawing.Branches[b]
	if branch.Index > 0 || (b+1 < len(list) && list[b+1].Part == branch.Part) {
		return branch.Ref + " " + branch.Pins[0] + "–" + branch.Pins[1]
	}
	return branch.Ref
}
