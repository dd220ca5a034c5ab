package cases

import (
	"loopwright/schematic"
	"loopwright/schematic/kinds"
	"loopwright/schematic/trace"
	"loopwright/solver"
)

// newNetwork makes the network of a drawing, still without laws.
func newNetwork[T solver.Scalar](drawing *trace.Drawing) *solver.Network[T] {
	network := &solver.Network[T]{
		Nodes: len(drawing.Potentials), Reference: drawing.Reference,
		Branches: make([]solver.Branch[T], len(drawing.Branches)), Meshes: make([]solver.Mesh, len(drawing.Meshes)),
	}
	for b, branch := range drawing.Branches {
		network.Branches[b].From, network.Branches[b].To = branch.From, branch.To
	}
	for m, mesh := range drawing.Meshes {
		path := make([]solver.Step, len(mesh.Path))
		for i, step := range mesh.Path {
			path[i] = solver.Step(step)
		}
		network.Meshes[m] = solver.Mesh{Name: mesh.Name, Path: path}
	}
	return network
}

// lawsOf gives the law of every branch in a case.
func lawsOf[T solver.Scalar](drawing *trace.Drawing, c *schematic.Case) []solver.Law[T] {
	laws := make([]solver.Law[T], 0, len(drawing.Branches))
	for b := 0; b < len(drawing.Branches); {
		part := &drawing.Sheet.Parts[drawing.Branches[b].Part]
		condition := kinds.Condition{System: drawing.Sheet.System, Supply: c.Supply, Position: c.Position(part)}
		for _, branch := range part.Kind.Branches(part.Fill(), condition) {
			law := branch.Law
			laws = append(laws, solver.Law[T]{Alpha: scalar[T](law.Alpha), Beta: scalar[T](law.Beta), Gamma: scalar[T](law.Gamma), Row: law.Row})
			b++
		}
	}
	return laws
}

// scalar takes the real part in DC, where the imaginary part is always 0.
func scalar[T solver.Scalar](value complex128) T {
	var out T
	switch p := any(&out).(type) {
	case *float64:
		*p = real(value)
	case *complex128:
		*p = value
	}
	return out
}

// phasor is a value as a complex number; −0 becomes 0, so that no file ever says −0.
func phasor[T solver.Scalar](value T) complex128 {
	switch v := any(value).(type) {
	case float64:
		return complex(v+0, 0)
	case complex128:
		return complex(real(v)+0, imag(v)+0)
	}
	return 0
}
