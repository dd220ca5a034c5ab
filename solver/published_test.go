package solver_test

import (
	"context"
	"encoding/json"
	"fmt"
	"math"
	"math/cmplx"
	"os"
	"slices"
	"testing"

	"loopwright/solver"
)

// published is the file of worked examples from textbooks and course notes; each names its source.
type published struct {
	Examples []example
}

type example struct {
	ID, Class, Source string
	Hertz             *float64 `json:"hz"`
	Meshes            int
	Elements          []element
	Published         []answer
	Raw               json.RawMessage `json:"-"` // the elements as they stand in the file
}

type element struct {
	Ref, Type, Pos, Neg string
	Value               number
	Control             struct {
		Of, Quantity string
		Gain         float64
	}
}

type answer struct {
	Quantity  string
	Of        json.RawMessage
	Value     number
	Digits    int
	DegDigits int `json:"deg_digits"`
	Exact     bool
	Magnitude bool
	Sense     string
}

// number is a real number, or a phasor as real and imaginary part or as magnitude and degrees.
type number struct {
	value complex128
	polar bool
}

func (n *number) UnmarshalJSON(data []byte) error {
	var real float64
	if json.Unmarshal(data, &real) == nil {
		n.value = complex(real, 0)
		return nil
	}
	var parts struct{ Re, Im, Mag, Deg float64 }
	if err := json.Unmarshal(data, &parts); err != nil {
		return err
	}
	if parts.Mag != 0 {
		n.value, n.polar = cmplx.Rect(parts.Mag, parts.Deg*math.Pi/180), true
		return nil
	}
	n.value = complex(parts.Re, parts.Im)
	return nil
}

func readPublished(t testing.TB) published {
	t.Helper()
	data, err := os.ReadFile("../testdata/reference/circuits.json")
	if err != nil {
		t.Fatal(err)
	}
	var file published
	if err := json.Unmarshal(data, &file); err != nil {
		t.Fatal(err)
	}
	var raw struct {
		Examples []struct{ Elements json.RawMessage }
	}
	if err := json.Unmarshal(data, &raw); err != nil {
		t.Fatal(err)
	}
	for k := range file.Examples {
		file.Examples[k].Raw = raw.Examples[k].Elements
	}
	return file
}

// circuit is an example as a network, with the branch of each reference and the node of each name.
type circuit struct {
	network  *solver.Network[complex128]
	branches map[string]int
	nodes    map[string]int
}

func (e *example) circuit(t testing.TB) circuit {
	t.Helper()
	c := circuit{branches: map[string]int{}, nodes: map[string]int{}}
	node := func(name string) int {
		if _, known := c.nodes[name]; !known {
			c.nodes[name] = len(c.nodes)
		}
		return c.nodes[name]
	}
	n := &solver.Network[complex128]{Reference: node("0")}
	for k, part := range e.Elements {
		c.branches[part.Ref] = k
	}
	for _, part := range e.Elements {
		law, err := e.law(part, c.branches)
		if err != nil {
			t.Fatal(err)
		}
		n.Branches = append(n.Branches, solver.Branch[complex128]{From: node(part.Pos), To: node(part.Neg), Law: law})
	}
	n.Nodes = len(c.nodes)
	n.Meshes = solver.FundamentalLoops(n.Nodes, n.Branches)
	c.network = n
	return c
}

func (e *example) law(part element, branches map[string]int) (solver.Law[complex128], error) {
	omega := 0.0
	if e.Hertz != nil {
		omega = 2 * math.Pi * *e.Hertz
	}
	gain := complex(part.Control.Gain, 0)
	control := branches[part.Control.Of]
	switch part.Type {
	case "V":
		return solver.VoltageSource(part.Value.value), nil
	case "I":
		return solver.CurrentSource(part.Value.value), nil
	case "R", "Z":
		return solver.Impedance(part.Value.value, 0), nil
	case "L":
		return solver.Impedance(complex(0, omega)*part.Value.value, 0), nil
	case "C":
		return solver.Impedance(1/(complex(0, omega)*part.Value.value), 0), nil
	case "VCVS":
		return solver.Law[complex128]{Beta: 1, Terms: []solver.Term[complex128]{{Branch: control, Beta: -gain}}}, nil
	case "CCVS":
		return solver.Law[complex128]{Beta: 1, Terms: []solver.Term[complex128]{{Branch: control, Alpha: -gain}}}, nil
	case "VCCS":
		return solver.Law[complex128]{Alpha: 1, Terms: []solver.Term[complex128]{{Branch: control, Beta: -gain}}}, nil
	case "CCCS":
		return solver.Law[complex128]{Alpha: 1, Terms: []solver.Term[complex128]{{Branch: control, Alpha: -gain}}}, nil
	}
	return solver.Law[complex128]{}, fmt.Errorf("no law for the type %q", part.Type)
}

func TestPublishedExamplesGiveThePublishedDigits(t *testing.T) {
	for _, example := range readPublished(t).Examples {
		if example.Class == "f" { // diodes: see TestIterationsWithOnePlanReachThePublishedOperatingPoints
			continue
		}
		t.Run(example.ID, func(t *testing.T) {
			c := example.circuit(t)
			if len(c.network.Meshes) != example.Meshes {
				t.Errorf("%d meshes, want %d", len(c.network.Meshes), example.Meshes)
			}
			solution, err := solver.Solve(context.Background(), c.network)
			if err != nil {
				t.Fatal(err)
			}
			if !solution.Audit.Passed {
				t.Errorf("audit not passed: %+v", solution.Audit)
			}
			for _, answer := range example.Published {
				checkAnswer(t, c, solution, answer)
			}
		})
	}
}

func checkAnswer(t *testing.T, c circuit, solution *solver.Solution[complex128], want answer) {
	t.Helper()
	var of string
	if json.Unmarshal(want.Of, &of) != nil {
		checkEquivalent(t, c, want)
		return
	}
	var got complex128
	switch b := c.branches[of]; want.Quantity {
	case "current", "mesh-current":
		got = solution.Current[b]
	case "voltage":
		got = solution.Voltage[b]
	case "power":
		got = complex(real(solution.Voltage[b]*cmplx.Conj(solution.Current[b])), 0)
	case "node-voltage":
		got = solution.Node[c.nodes[of]]
	default:
		t.Fatalf("no check for the quantity %q", want.Quantity)
	}
	if want.Sense == "neg-to-pos" || want.Sense == "delivered" {
		got = -got
	}
	compare(t, want, fmt.Sprintf("%s of %s", want.Quantity, of), got)
}

// compare holds a value against the published one: to half a unit of its last published digit.
func compare(t *testing.T, want answer, name string, got complex128) {
	t.Helper()
	if want.Magnitude {
		got = complex(cmplx.Abs(got), 0)
	}
	if want.Value.polar {
		degrees := cmplx.Phase(want.Value.value) * 180 / math.Pi
		compareReal(t, name+", magnitude", cmplx.Abs(got), cmplx.Abs(want.Value.value), lastDigit(cmplx.Abs(want.Value.value), want.Digits), false)
		compareReal(t, name+", degrees", cmplx.Phase(got)*180/math.Pi, degrees, lastDigit(degrees, want.DegDigits), false)
		return
	}
	compareReal(t, name+", real part", real(got), real(want.Value.value), unit(want), want.Exact)
	compareReal(t, name+", imaginary part", imag(got), imag(want.Value.value), unit(want), want.Exact)
}

// unit is one unit of the last published digit; the digits of a phasor are those of its larger part.
func unit(want answer) float64 {
	largest := max(math.Abs(real(want.Value.value)), math.Abs(imag(want.Value.value)))
	return lastDigit(largest, want.Digits)
}

func lastDigit(value float64, digits int) float64 {
	if value == 0 {
		return math.Pow(10, -float64(digits))
	}
	return math.Pow(10, math.Floor(math.Log10(math.Abs(value)))+1-float64(digits))
}

func compareReal(t *testing.T, name string, got, want, unit float64, exact bool) {
	t.Helper()
	tolerance := unit/2 + 1e-12
	if exact {
		tolerance = 1e-12 * max(1, math.Abs(want))
	}
	if math.Abs(got-want) > tolerance {
		t.Errorf("%s: %.10g, published %.10g in units of %g", name, got, want, unit)
	}
}

// checkEquivalent measures between two nodes: a branch added there is open for the voltage of Thévenin, its response to a
// current gives the resistance, and as a short circuit it carries the current of Norton.
func checkEquivalent(t *testing.T, c circuit, want answer) {
	t.Helper()
	var nodes []string
	if err := json.Unmarshal(want.Of, &nodes); err != nil || len(nodes) != 2 {
		t.Fatalf("%s is of %s", want.Quantity, want.Of)
	}
	n := *c.network
	probe := len(n.Branches)
	n.Branches = append(slices.Clone(n.Branches), solver.Branch[complex128]{
		From: c.nodes[nodes[0]], To: c.nodes[nodes[1]], Law: solver.Open[complex128](),
	})
	n.Meshes = solver.FundamentalLoops(n.Nodes, n.Branches)
	plan, err := solver.Prepare(context.Background(), &n)
	if err != nil {
		t.Fatal(err)
	}
	laws := lawsOf(&n)
	if want.Quantity == "norton-current" {
		laws[probe] = solver.VoltageSource[complex128](0)
	}
	solution, err := plan.Solve(context.Background(), laws)
	if err != nil {
		t.Fatal(err)
	}
	response, err := plan.Respond(probe)
	if err != nil {
		t.Fatal(err)
	}
	got := map[string]complex128{
		"thevenin-voltage":    solution.Voltage[probe],
		"thevenin-resistance": -response.Voltage[probe],
		"norton-current":      solution.Current[probe],
	}
	compare(t, want, want.Quantity, got[want.Quantity])
}
