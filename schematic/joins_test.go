package schematic_test

import (
	"fmt"
	"math/rand/v2"
	"slices"
	"testing"

	"loopwright/schematic"
	"loopwright/schematic/kinds"
)

// p is a place; line is a chain of places.
func p(x, y int) schematic.Point { return schematic.Point{X: x, Y: y} }

func line(places ...schematic.Point) []schematic.Point { return places }

// drawn is a sheet with resistors R1, R2 … at the given places, not turned, and wires w1, w2 … .
func drawn(resistors []schematic.Point, wires ...[]schematic.Point) *schematic.Sheet {
	sheet := schematic.New("drawn")
	for i, at := range resistors {
		sheet.Parts = append(sheet.Parts, schematic.Part{Ref: fmt.Sprintf("R%d", i+1), Kind: kinds.Resistor, At: at})
	}
	for i, points := range wires {
		sheet.Wires = append(sheet.Wires, schematic.Wire{ID: fmt.Sprintf("w%d", i+1), Points: points})
	}
	return sheet
}

func TestWhatJoins(t *testing.T) {
	for _, c := range []struct {
		name   string
		sheet  *schematic.Sheet
		joint  *schematic.Point
		joined bool // whether the first wire and the second are one
	}{
		{name: "two ends on one place", sheet: drawn(nil, line(p(0, 0), p(4, 0)), line(p(4, 0), p(4, 4))), joined: true},
		{name: "an end on the middle of a wire", sheet: drawn(nil, line(p(0, 0), p(4, 0)), line(p(2, 0), p(2, 4))), joined: true},
		{name: "a corner on the middle of a wire", sheet: drawn(nil, line(p(0, 0), p(4, 0)), line(p(2, 4), p(2, 0), p(3, 0), p(3, -4))), joined: true},
		{name: "a corner that only touches", sheet: drawn(nil, line(p(0, 0), p(4, 0)), line(p(2, 4), p(2, 0), p(8, 0))), joined: true},
		{name: "corner on corner", sheet: drawn(nil, line(p(0, 4), p(0, 0), p(4, 0)), line(p(0, -4), p(0, 0), p(-4, 0))), joined: true},
		{name: "wires that run along one another", sheet: drawn(nil, line(p(0, 0), p(9, 0)), line(p(3, 0), p(12, 0))), joined: true},
		{name: "a plain crossing", sheet: drawn(nil, line(p(0, 0), p(4, 0)), line(p(2, -2), p(2, 2)))},
		{name: "a place on the straight is no corner", sheet: drawn(nil, line(p(0, 0), p(2, 0), p(4, 0)), line(p(2, -2), p(2, 0), p(2, 2)))},
		{name: "a crossing with a joint", sheet: drawn(nil, line(p(0, 0), p(4, 0)), line(p(2, -2), p(2, 2))), joint: &schematic.Point{X: 2}, joined: true},
		{name: "a pin on a crossing", sheet: drawn(line(p(2, 2)), line(p(0, 0), p(4, 0)), line(p(2, -2), p(2, 2))), joined: true},
		{name: "a third wire's end on a crossing", sheet: drawn(nil, line(p(0, 0), p(4, 0)), line(p(2, -2), p(2, 2)), line(p(2, 0), p(3, 0))), joined: true},
		{name: "nothing between", sheet: drawn(nil, line(p(0, 0), p(4, 0)), line(p(5, 0), p(8, 0)))},
		{name: "through a third wire", sheet: drawn(nil, line(p(0, 0), p(4, 0)), line(p(0, 5), p(4, 5)), line(p(2, 0), p(2, 5))), joined: true},
		{name: "a wire that turns back on itself ends nothing", sheet: drawn(nil, line(p(0, 0), p(4, 0), p(1, 0)), line(p(4, 0), p(4, 3))), joined: true},
	} {
		t.Run(c.name, func(t *testing.T) {
			if c.joint != nil {
				c.sheet.Joints = append(c.sheet.Joints, *c.joint)
			}
			joins := schematic.Join(c.sheet)
			if got := joins.Wires[0] == joins.Wires[1]; got != c.joined {
				t.Errorf("joined: %v", got)
			}
		})
	}
}

func TestPinsJoinWithPinsAndWires(t *testing.T) {
	// R1 stands on R2; R3's first pin lies on the middle of a wire that begins at R1's first pin.
	sheet := drawn(line(p(0, 2), p(0, 6), p(5, 2)), line(p(0, 0), p(8, 0)))
	joins := schematic.Join(sheet)
	if joins.Pins[0][1] != joins.Pins[1][0] {
		t.Error("pin on pin is not joined")
	}
	if joins.Pins[0][0] != joins.Wires[0] || joins.Pins[2][0] != joins.Wires[0] {
		t.Error("pin on a wire's end or middle is not joined")
	}
	if joins.Groups != 4 {
		t.Errorf("%d groups, want the wire with two pins, the pair, and two pins alone", joins.Groups)
	}
}

func TestDotsStandWhereThreeWaysMeetAndCrossingsWhereNoneDo(t *testing.T) {
	sheet := drawn(line(p(10, 2)),
		line(p(0, 0), p(10, 0)),          // ends at R1's first pin: two ways, no dot
		line(p(2, 0), p(2, 6)),           // a T at 2, 0
		line(p(5, -3), p(5, 3)),          // crosses plainly at 5, 0
		line(p(7, -3), p(7, 3)),          // crosses at 7, 0 with a joint
		line(p(0, 6), p(2, 6)),           // meets an end at 2, 6: two ways
		line(p(0, 3), p(5, 3), p(5, -1)), // runs along the third wire, and crosses the second
	)
	sheet.Joints = line(p(7, 0))
	joins := schematic.Join(sheet)
	if want := line(p(2, 0), p(7, 0)); !slices.Equal(joins.Dots, want) {
		t.Errorf("dots %v, want %v", joins.Dots, want)
	}
	if want := line(p(5, 0), p(2, 3)); !slices.Equal(joins.Crossings, want) {
		t.Errorf("crossings %v, want %v", joins.Crossings, want)
	}
}

func TestAStretchThatIsDrawnTwiceIsOnePieceOfTheFirstWire(t *testing.T) {
	joins := schematic.Join(drawn(nil, line(p(0, 0), p(9, 0)), line(p(12, 0), p(3, 0))))
	want := []schematic.Piece{{Wire: 0, From: p(0, 0), To: p(3, 0)}, {Wire: 0, From: p(3, 0), To: p(9, 0)}, {Wire: 1, From: p(12, 0), To: p(9, 0)}}
	if !slices.Equal(joins.Pieces, want) {
		t.Errorf("pieces %v, want %v", joins.Pieces, want)
	}
	if want := line(p(0, 0), p(3, 0), p(9, 0), p(12, 0)); !slices.Equal(joins.Places, want) || joins.Node[p(9, 0)] != 2 {
		t.Errorf("places %v, want %v", joins.Places, want)
	}
}

// picture is a sheet taken apart into single grid steps, to find what joins by looking at each step and each place.
type picture struct {
	level, upright map[schematic.Point][]int // the wires on the step to the right and on the step down from a place
	things         map[schematic.Point][]int // what ends, bends or has a pin at a place
}

const pinsFrom = 1000 // things below are wires, above are pins

func pictureOf(sheet *schematic.Sheet) (picture, int) {
	pic := picture{map[schematic.Point][]int{}, map[schematic.Point][]int{}, map[schematic.Point][]int{}}
	for w, wire := range sheet.Wires {
		for i, q := range wire.Points {
			if i == 0 || i == len(wire.Points)-1 || !straight(wire.Points[i-1], q, wire.Points[i+1]) {
				pic.things[q] = append(pic.things[q], w)
			}
			for at := q; i > 0 && at != wire.Points[i-1]; {
				next := toward(at, wire.Points[i-1])
				if next.Y == at.Y {
					left := p(min(at.X, next.X), at.Y)
					pic.level[left] = append(pic.level[left], w)
				} else {
					upper := p(at.X, min(at.Y, next.Y))
					pic.upright[upper] = append(pic.upright[upper], w)
				}
				at = next
			}
		}
	}
	pins := pinsFrom
	for _, part := range sheet.Parts {
		for _, pin := range part.Kind.Pins {
			pic.things[part.Pin(pin)] = append(pic.things[part.Pin(pin)], pins)
			pins++
		}
	}
	return pic, pins
}

func straight(a, b, c schematic.Point) bool {
	return (b.X-a.X)*(c.X-b.X) > 0 && a.Y == c.Y || (b.Y-a.Y)*(c.Y-b.Y) > 0 && a.X == c.X
}

func toward(from, to schematic.Point) schematic.Point {
	sign := func(n int) int { return max(-1, min(1, n)) }
	return p(from.X+sign(to.X-from.X), from.Y+sign(to.Y-from.Y))
}

// passing lists the wires on the four steps round a place.
func (pic picture) passing(q schematic.Point) []int {
	return slices.Concat(pic.level[q], pic.level[p(q.X-1, q.Y)], pic.upright[q], pic.upright[p(q.X, q.Y-1)])
}

// groups joins step by step after the words of the definition.
func (pic picture) groups(sheet *schematic.Sheet, pins int) func(thing int) int {
	group := make([]int, pins)
	for i := range group {
		group[i] = i
	}
	merge := func(things []int) {
		for _, thing := range things[min(1, len(things)):] {
			from, to := group[thing], group[things[0]]
			for i := range group {
				if group[i] == from {
					group[i] = to
				}
			}
		}
	}
	for q, things := range pic.things {
		merge(slices.Concat(things, pic.passing(q)))
	}
	for _, wires := range pic.level {
		merge(wires)
	}
	for _, wires := range pic.upright {
		merge(wires)
	}
	for _, q := range sheet.Joints {
		merge(pic.passing(q))
	}
	return func(thing int) int { return group[thing] }
}

func TestRandomSheetsJoinAsTheDefinitionSays(t *testing.T) {
	random := hand{pick: rand.New(rand.NewPCG(11, 12)).IntN}
	for round := range 300 {
		sheet := play(random, 50, func(step) {})
		pic, pins := pictureOf(sheet)
		slow := pic.groups(sheet, pins)
		joins := schematic.Join(sheet)
		var fast []int
		fast = append(fast, joins.Wires...)
		things := make([]int, len(joins.Wires))
		for i := range things {
			things[i] = i
		}
		for _, groups := range joins.Pins {
			fast = append(fast, groups...)
		}
		for thing := pinsFrom; thing < pins; thing++ {
			things = append(things, thing)
		}
		for i := range things {
			for k := range i {
				if (fast[i] == fast[k]) != (slow(things[i]) == slow(things[k])) {
					t.Fatalf("round %d: things %d and %d\n%s", round, things[i], things[k], schematic.Encode(sheet))
				}
			}
		}
		if want := pic.crossings(sheet); !slices.Equal(joins.Crossings, want) {
			t.Fatalf("round %d: crossings %v, want %v\n%s", round, joins.Crossings, want, schematic.Encode(sheet))
		}
	}
}

// crossings lists, in reading order, where wires cross and nothing makes them join.
func (pic picture) crossings(sheet *schematic.Sheet) []schematic.Point {
	var list []schematic.Point
	for q := range pic.level {
		crossed := len(pic.level[p(q.X-1, q.Y)]) > 0 && len(pic.upright[q]) > 0 && len(pic.upright[p(q.X, q.Y-1)]) > 0
		if crossed && len(pic.things[q]) == 0 && !slices.Contains(sheet.Joints, q) {
			list = append(list, q)
		}
	}
	slices.SortFunc(list, func(a, b schematic.Point) int { return 1000*(a.Y-b.Y) + a.X - b.X })
	return list
}

func TestASheetIsJoinedAlikeHoweverFarItReaches(t *testing.T) {
	random := hand{pick: rand.New(rand.NewPCG(13, 14)).IntN}
	for range 50 {
		sheet := play(random, 50, func(step) {})
		near := schematic.Join(sheet)
		wide := *sheet
		wide.Wires = append(slices.Clone(sheet.Wires), schematic.Wire{ID: "far", Points: line(p(9000, 9000), p(9001, 9000))})
		far := schematic.Join(&wide)
		last := len(far.Places) - 2
		if !slices.Equal(far.Places[:last], near.Places) || !slices.Equal(far.Pieces[:len(far.Pieces)-1], near.Pieces) ||
			!slices.Equal(far.Dots, near.Dots) || !slices.Equal(far.Crossings, near.Crossings) || far.Groups != near.Groups+1 {
			t.Fatalf("near %+v\nfar %+v", near, far)
		}
	}
}
