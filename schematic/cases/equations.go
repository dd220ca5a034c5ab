package cases

import (
	"math/cmplx"
	"slices"
	"strconv"
	"strings"

	"loopwright/schematic/trace"
	"loopwright/solver"
)

// Equation is one equation of the record, with symbols and with numbers. Of names the meshes that it is about: one for
// a mesh, several for a supermesh, those through the branch for the constraint of a source or an open contact.
type Equation struct {
	Of      []string
	Symbols string // "−E(G1) + R(F1)·i1 + R(P1)·(i1 − i2) = 0"
	Numbers string // "−24 + 0.05·i1 + 288·(i1 − i2) = 0"
}

// record writes the equations of one case.
type record[T solver.Scalar] struct {
	drawing *trace.Drawing
	laws    []solver.Law[T]
	through [][]trace.Step // for each branch, the meshes through it with their sense
}

// equations writes Kirchhoff's voltage law around each mesh or supermesh, and then the constraint of each branch that
// sets a current. A mesh that runs alone through such a branch has its current set by it and needs no voltage law.
func equations[T solver.Scalar](drawing *trace.Drawing, laws []solver.Law[T], c *Case) []Equation {
	r := record[T]{drawing, laws, make([][]trace.Step, len(drawing.Branches))}
	for m, mesh := range drawing.Meshes {
		for _, step := range mesh.Path {
			r.through[step.Branch] = append(r.through[step.Branch], trace.Step{Branch: m, Sense: step.Sense})
		}
	}
	var list []Equation
	for _, group := range groups(len(drawing.Meshes), c.Supermeshes) {
		if equation, ok := r.voltageLaw(group); ok {
			list = append(list, equation)
		}
	}
	for b := range drawing.Branches {
		if laws[b].Beta == 0 && len(r.through[b]) > 0 {
			list = append(list, r.constraint(b))
		}
	}
	return list
}

// groups lists the supermeshes and the meshes that are alone, in the order of their first mesh.
func groups(meshes int, fused []Supermesh) [][]int {
	of := make([]int, meshes)
	for i := range of {
		of[i] = i
	}
	for _, super := range fused {
		for _, m := range super.Meshes {
			of[m] = super.Meshes[0]
		}
	}
	var list [][]int
	for m := range of {
		if of[m] != m {
			continue
		}
		group := []int{}
		for k := range of {
			if of[k] == m {
				group = append(group, k)
			}
		}
		list = append(list, group)
	}
	return list
}

// voltageLaw sums the voltages around a group of meshes: sources first, then drops in the order of the way. It is false
// when a branch on the way sets its current, so that its voltage is not known from its law.
func (r *record[T]) voltageLaw(group []int) (Equation, bool) {
	var sources, drops expression
	seen := map[int]bool{}
	for _, m := range group {
		for _, step := range r.drawing.Meshes[m].Path {
			b := step.Branch
			sense := r.senseIn(b, group)
			if seen[b] || sense == 0 {
				continue
			}
			seen[b] = true
			law := &r.laws[b]
			if law.Beta == 0 {
				return Equation{}, false
			}
			emf, impedance := phasor(law.Gamma/law.Beta), phasor(-law.Alpha/law.Beta)
			if emf != 0 {
				sources.add(complex(float64(sense), 0)*emf, sense, "E("+r.name(b)+")", "")
			}
			if impedance != 0 {
				currents := r.currents(b, sense)
				drops.add(impedance, 1, r.letter()+"("+r.name(b)+")", currents)
			}
		}
	}
	symbols := append(sources.symbols, drops.symbols...)
	numbers := append(sources.numbers, drops.numbers...)
	return Equation{r.names(group), sum(symbols) + " = 0", sum(numbers) + " = 0"}, true
}

// constraint says which current a branch sets.
func (r *record[T]) constraint(b int) Equation {
	law := &r.laws[b]
	meshes := make([]int, 0, 2)
	for _, step := range r.through[b] {
		meshes = append(meshes, step.Branch)
	}
	left := strings.Trim(r.currents(b, 1), "()")
	value := phasor(law.Gamma / law.Alpha)
	right, symbol := number(value), "I("+r.name(b)+")"
	if value == 0 {
		symbol = "0"
	}
	return Equation{r.names(meshes), left + " = " + symbol, left + " = " + right}
}

// senseIn is how a group of meshes as a whole runs through a branch: 0 when two of them run against one another.
func (r *record[T]) senseIn(b int, group []int) int {
	sense := 0
	for _, step := range r.through[b] {
		if slices.Contains(group, step.Branch) {
			sense += step.Sense
		}
	}
	return sense
}

// currents is the current through a branch, counted in a sense, in terms of mesh currents: "i1" or "(i1 − i2)".
func (r *record[T]) currents(b, sense int) string {
	var terms []string
	for _, step := range r.through[b] {
		name := "i" + strings.TrimPrefix(r.drawing.Meshes[step.Branch].Name, "m")
		if step.Sense*sense < 0 {
			name = "−" + name
		}
		terms = append(terms, name)
	}
	slices.SortStableFunc(terms, func(a, b string) int { return strings.Compare(signLast(a), signLast(b)) })
	if len(terms) == 1 && !strings.HasPrefix(terms[0], "−") {
		return terms[0]
	}
	return "(" + sum(terms) + ")"
}

// signLast sorts terms with a plus in front before those with a minus.
func signLast(term string) string {
	if strings.HasPrefix(term, "−") {
		return "1"
	}
	return "0"
}

func (r *record[T]) letter() string {
	var value T
	if _, ac := any(value).(complex128); ac {
		return "Z"
	}
	return "R"
}

// name is the reference of a branch's part, with its pins where the part has several branches.
func (r *record[T]) name(b int) string {
	branch := &r.drawing.Branches[b]
	several := branch.Index > 0 || (b+1 < len(r.drawing.Branches) && r.drawing.Branches[b+1].Part == branch.Part)
	if several {
		return branch.Ref + " " + branch.Pins[0] + "–" + branch.Pins[1]
	}
	return branch.Ref
}

func (r *record[T]) names(meshes []int) []string {
	names := make([]string, len(meshes))
	for i, m := range meshes {
		names[i] = r.drawing.Meshes[m].Name
	}
	return names
}

// expression collects terms twice: in symbols, and in numbers.
type expression struct{ symbols, numbers []string }

// add puts a term at the end: a factor with its sign, its symbol, and the currents it multiplies, if any.
func (e *expression) add(value complex128, sense int, symbol, currents string) {
	if sense < 0 {
		symbol = "−" + symbol
	}
	figure := number(value)
	if currents != "" {
		symbol += "·" + currents
		figure += "·" + currents
	}
	e.symbols = append(e.symbols, symbol)
	e.numbers = append(e.numbers, figure)
}

// sum joins terms with their signs.
func sum(terms []string) string {
	if len(terms) == 0 {
		return "0"
	}
	var out strings.Builder
	for i, term := range terms {
		bare, negative := strings.CutPrefix(term, "−")
		switch {
		case i == 0:
			out.WriteString(term)
		case negative:
			out.WriteString(" − " + bare)
		default:
			out.WriteString(" + " + bare)
		}
	}
	return out.String()
}

// number writes a figure of an equation with four significant digits.
func number(value complex128) string {
	if imag(value) == 0 {
		return figure(real(value))
	}
	if real(value) == 0 {
		return "j" + figure(imag(value))
	}
	sign := " + j"
	if imag(value) < 0 {
		sign = " − j"
	}
	return "(" + figure(real(value)) + sign + figure(cmplx.Abs(complex(imag(value), 0))) + ")"
}

func figure(value float64) string {
	text := strconv.FormatFloat(value, 'g', 4, 64)
	mantissa, exponent, scientific := strings.Cut(text, "e")
	if scientific {
		power, _ := strconv.Atoi(exponent) // FormatFloat writes a whole number there
		mantissa += "×10" + superscript(power)
	}
	return strings.Replace(mantissa, "-", "−", 1)
}

func superscript(power int) string {
	return strings.Map(func(r rune) rune {
		if r == '-' {
			return '⁻'
		}
		return []rune("⁰¹²³⁴⁵⁶⁷⁸⁹")[r-'0']
	}, strconv.Itoa(power))
}
