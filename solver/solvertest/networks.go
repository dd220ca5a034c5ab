// Package solvertest holds networks made from seeds, and the checks that every way of solving a network must pass.
package solvertest

import (
	"math"
	"math/rand/v2"
	"strconv"

	"loopwright/solver"
)

// Laws gives one law after the other.
type Laws[T solver.Scalar] func() solver.Law[T]

// Mix says what random laws are made of. The shares are probabilities; what they leave are impedances.
type Mix struct {
	Decades         float64 // impedances spread evenly over this many powers of ten around 1 Ω
	Ideal, Real     float64 // voltage sources without and with impedance
	Currents        float64 // current sources
	Open, Closed    float64 // contacts; closed ones have 0.02 Ω
	Admittance, Row float64 // conductances; impedances that keep their row
}

// RealLaws draws laws of direct current from the mix.
func (m Mix) RealLaws(random *rand.Rand) Laws[float64] {
	return draw(m, random, func() float64 { return math.Pow(10, m.Decades*(random.Float64()-0.5)) },
		func(size float64) float64 { return size * float64(1+random.IntN(3)) })
}

// ComplexLaws draws laws of alternating current from the mix: impedances have any phase from −90° to 90°, sources any.
func (m Mix) ComplexLaws(random *rand.Rand) Laws[complex128] {
	phasor := func(size, degrees float64) complex128 {
		sin, cos := math.Sincos(degrees * math.Pi / 180)
		return complex(size*cos, size*sin)
	}
	return draw(m, random,
		func() complex128 {
			return phasor(math.Pow(10, m.Decades*(random.Float64()-0.5)), 89*(2*random.Float64()-1))
		},
		func(size float64) complex128 { return phasor(size, 360*random.Float64()) })
}

func draw[T solver.Scalar](m Mix, random *rand.Rand, impedance func() T, source func(size float64) T) Laws[T] {
	return func() solver.Law[T] {
		choice := random.Float64()
		within := func(share float64) bool {
			choice -= share
			return choice < 0
		}
		switch {
		case within(m.Ideal):
			return solver.VoltageSource(source(12))
		case within(m.Real):
			return solver.Impedance(impedance(), source(12))
		case within(m.Currents):
			return solver.CurrentSource(source(0.5))
		case within(m.Open):
			return solver.Open[T]()
		case within(m.Closed):
			law := solver.Impedance[T](0.02, 0)
			law.Row = true
			return law
		case within(m.Admittance):
			return solver.Conductance(1/impedance(), 0)
		case within(m.Row):
			law := solver.Impedance(impedance(), 0)
			law.Row = true
			return law
		}
		return solver.Impedance(impedance(), 0)
	}
}

// Ladder is a source, and then sections of one branch along and one across: as many meshes as sections.
func Ladder[T solver.Scalar](sections int, law Laws[T]) *solver.Network[T] {
	n := &solver.Network[T]{Nodes: sections + 2}
	across := 0
	n.Branches = append(n.Branches, solver.Branch[T]{From: 1, To: 0, Law: solver.Impedance[T](0.05, 24)})
	for k := range sections {
		along := len(n.Branches)
		n.Branches = append(n.Branches,
			solver.Branch[T]{From: k + 1, To: k + 2, Law: law()},
			solver.Branch[T]{From: k + 2, To: 0, Law: law()})
		n.Meshes = append(n.Meshes, solver.Mesh{
			Name: "m" + strconv.Itoa(k+1),
			Path: []solver.Step{{Branch: across, Sense: -1}, {Branch: along, Sense: 1}, {Branch: along + 1, Sense: 1}},
		})
		across = along + 1
	}
	return n
}

// Multigraph has branches between any two nodes, in parallel, from a node to itself, and as bridges; it may fall into
// several components.
func Multigraph[T solver.Scalar](random *rand.Rand, nodes, branches int, law Laws[T]) *solver.Network[T] {
	n := &solver.Network[T]{Nodes: nodes, Reference: random.IntN(nodes)}
	for range branches {
		n.Branches = append(n.Branches, solver.Branch[T]{From: random.IntN(nodes), To: random.IntN(nodes), Law: law()})
	}
	n.Meshes = solver.FundamentalLoops(nodes, n.Branches)
	return n
}
