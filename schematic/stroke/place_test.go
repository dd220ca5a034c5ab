package stroke_test

import (
	"math"
	"testing"

	"loopwright/schematic/stroke"
)

func same(a, b stroke.Box) bool {
	const little = 1e-12
	return math.Abs(a.Left-b.Left) < little && math.Abs(a.Top-b.Top) < little && math.Abs(a.Right-b.Right) < little && math.Abs(a.Bottom-b.Bottom) < little
}

func TestTheBoundsOfAnArcHoldJustTheArc(t *testing.T) {
	half := math.Sqrt(0.5)
	for _, c := range []struct {
		start, sweep float64
		want         stroke.Box
	}{
		{0, 90, stroke.Box{Left: 0, Top: 0, Right: 1, Bottom: 1}},
		{-135, 90, stroke.Box{Left: -half, Top: -1, Right: half, Bottom: -half}},
		{-45, -90, stroke.Box{Left: -half, Top: -1, Right: half, Bottom: -half}},
		{-90, 180, stroke.Box{Left: 0, Top: -1, Right: 1, Bottom: 1}},
		{10, 360, stroke.Box{Left: -1, Top: -1, Right: 1, Bottom: 1}},
	} {
		got, ok := stroke.List{stroke.Arc{Radius: 1, Start: c.start, Sweep: c.sweep}}.Bounds()
		if !ok || !same(got, c.want) {
			t.Errorf("from %v over %v: %v, want %v", c.start, c.sweep, got, c.want)
		}
	}
}

func TestPlacingMirrorsThenTurnsThenMoves(t *testing.T) {
	list := stroke.List{stroke.Line(1, 0, 3, 0), stroke.Arc{Center: stroke.Point{X: 1}, Radius: 1, Start: 0, Sweep: 90}}
	placed := list.Placed(stroke.Point{X: 10, Y: 20}, 90, true)
	// Mirrored, (1, 0) is (−1, 0); a quarter turn takes (x, y) to (−y, x), so that it is (0, −1); then it is moved.
	if got := placed[0].(stroke.Path).Points[0]; math.Abs(got.X-10) > 1e-12 || math.Abs(got.Y-19) > 1e-12 {
		t.Errorf("the line begins at %v", got)
	}
	// The arc ran from 0° to 90° about (1, 0): mirrored it runs from 180° back to 90°, turned from 270° back to 180°.
	arc := placed[1].(stroke.Arc)
	if arc.Start != 270 || arc.Sweep != -90 {
		t.Errorf("the arc starts at %v and sweeps %v", arc.Start, arc.Sweep)
	}
}
