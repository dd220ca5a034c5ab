package trace_test

import (
	"slices"
	"testing"

	"gonum.org/v1/gonum/mat"
	"pgregory.net/rapid"

	"loopwright/schematic"
	"loopwright/schematic/sheettest"
	"loopwright/schematic/trace"
)

// rank is how many independent meshes a circuit has, counted by gonum: the branches less the rank of the incidence matrix.
func rank(d *trace.Drawing) int {
	if len(d.Branches) == 0 {
		return 0
	}
	incidence := mat.NewDense(len(d.Potentials), len(d.Branches), nil)
	for b, branch := range d.Branches {
		if branch.From != branch.To {
			incidence.Set(branch.From, b, 1)
			incidence.Set(branch.To, b, -1)
		}
	}
	return len(d.Branches) - rankOf(incidence)
}

// rankOf is the rank of a matrix of small whole numbers, by its singular values.
func rankOf(m *mat.Dense) int {
	var svd mat.SVD
	if !svd.Factorize(m, mat.SVDNone) {
		panic("no singular values")
	}
	return svd.Rank(1e-9)
}

// checkMeshes checks what must hold of the meshes of any drawing: each closes, there are as many as needed, they are
// independent, and drawn ones run clockwise.
func checkMeshes(t *rapid.T, d *trace.Drawing) {
	if want := rank(d); len(d.Meshes) != want {
		t.Fatalf("%d meshes, want %d", len(d.Meshes), want)
	}
	if len(d.Meshes) == 0 {
		return
	}
	paths := mat.NewDense(len(d.Meshes), len(d.Branches), nil)
	for m, mesh := range d.Meshes {
		checkClosed(t, d, mesh)
		for _, step := range mesh.Path {
			paths.Set(m, step.Branch, float64(step.Sense))
		}
		if mesh.Drawn && area(mesh) <= 0 {
			t.Fatalf("%s does not run clockwise around anything", mesh.Name)
		}
	}
	if rankOf(paths) != len(d.Meshes) {
		t.Fatalf("of %d meshes only %d are independent", len(d.Meshes), rankOf(paths))
	}
}

func checkClosed(t *rapid.T, d *trace.Drawing, mesh trace.Mesh) {
	last := mesh.Path[len(mesh.Path)-1]
	at := end(d, last)
	seen := map[int]bool{}
	for _, step := range mesh.Path {
		if end(d, trace.Step{Branch: step.Branch, Sense: -step.Sense}) != at || seen[step.Branch] {
			t.Fatalf("%s does not close: %v", mesh.Name, mesh.Path)
		}
		at, seen[step.Branch] = end(d, step), true
	}
}

func end(d *trace.Drawing, step trace.Step) int {
	if step.Sense > 0 {
		return d.Branches[step.Branch].To
	}
	return d.Branches[step.Branch].From
}

// area is twice the area of a mesh's outline, positive when it runs clockwise.
func area(mesh trace.Mesh) float64 {
	sum := 0.0
	for i, a := range mesh.Outline {
		b := mesh.Outline[(i+1)%len(mesh.Outline)]
		sum += a.X*b.Y - b.X*a.Y
	}
	return sum
}

func TestAPlaneDrawingIsSolvedAlongItsFaces(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		b := sheettest.NewBuilder("Plane")
		sheettest.Lattice(t, b, sheettest.Choice{Columns: 5, Rows: 4, Ideal: true, Switches: 20})
		d := trace.Trace(b.Sheet)
		checkMeshes(t, d)
		for _, mesh := range d.Meshes {
			if !mesh.Drawn {
				t.Fatalf("%s is not drawn", mesh.Name)
			}
		}
	})
}

func TestCrossingsAndNamesAreCompletedByTheShortestLoops(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		b := sheettest.NewBuilder("Crossed")
		choice := sheettest.Choice{Columns: 3, Rows: 3, Ideal: true, Switches: 20}
		sheettest.Lattice(t, b, choice)
		if rapid.Bool().Draw(t, "crossed") {
			b.Shift = schematic.Point{X: 3, Y: 3}
			sheettest.Lattice(t, b, choice)
		}
		sheettest.Names(t, b, 6)
		d := trace.Trace(b.Sheet)
		checkMeshes(t, d)
		if len(d.Meshes) <= 10 {
			checkShortest(t, d)
		}
	})
}

// checkShortest compares the lengths of the loops with those that a search through every closed way there is would choose.
// All sums of meshes over the field of two elements are all closed ways; taking the shortest that is independent of those
// taken before, again and again, gives the shortest basis, since independent sets form a matroid.
func checkShortest(t *rapid.T, d *trace.Drawing) {
	var lengths []int
	type way struct {
		of, length int // which meshes it is the sum of, how many branches it has
	}
	var ways []way
	for of := 1; of < 1<<len(d.Meshes); of++ {
		parity := make([]int, len(d.Branches))
		for m, mesh := range d.Meshes {
			if of>>m&1 == 1 {
				for _, step := range mesh.Path {
					parity[step.Branch] ^= 1
				}
			}
		}
		length := 0
		for _, odd := range parity {
			length += odd
		}
		ways = append(ways, way{of, length})
	}
	slices.SortStableFunc(ways, func(a, b way) int { return a.length - b.length })
	var pivots []int
	independent := func(of int) bool {
		for _, pivot := range pivots {
			of = min(of, of^pivot)
		}
		if of == 0 {
			return false
		}
		pivots = append(pivots, of)
		slices.SortFunc(pivots, func(a, b int) int { return b - a })
		return true
	}
	for m, mesh := range d.Meshes {
		if mesh.Drawn {
			independent(1 << m)
		} else {
			lengths = append(lengths, len(mesh.Path))
		}
	}
	slices.Sort(lengths)
	var shortest []int
	for _, way := range ways {
		if independent(way.of) {
			shortest = append(shortest, way.length)
		}
	}
	if !slices.Equal(lengths, shortest) {
		t.Fatalf("loops of %v branches, shortest are %v", lengths, shortest)
	}
}

func TestTheSameSheetAlwaysHasTheSameMeshes(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		b := sheettest.NewBuilder("Twice")
		sheettest.Lattice(t, b, sheettest.Choice{Columns: 4, Rows: 3, Ideal: true, Switches: 20})
		sheettest.Names(t, b, 5)
		first, second := trace.Trace(b.Sheet), trace.Trace(b.Sheet)
		for m := range first.Meshes {
			if !slices.Equal(first.Meshes[m].Path, second.Meshes[m].Path) {
				t.Fatalf("%s runs along %v and then along %v", first.Meshes[m].Name, first.Meshes[m].Path, second.Meshes[m].Path)
			}
		}
	})
}

func TestWhateverIsDrawnHasItsMeshes(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		b := sheettest.NewBuilder("Soup")
		sheettest.Soup(t, b)
		d := trace.Trace(b.Sheet)
		checkMeshes(t, d)
		if len(d.Meshes) <= 10 {
			checkShortest(t, d)
		}
	})
}
