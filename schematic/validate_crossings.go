package schematic

import (
	"cmp"
	"slices"
)

// mostCrossings bounds how often wires may cross on a sheet: no drawing comes near it, and what follows the crossings is
// kept from running out of memory.
const mostCrossings = 100_000

func checkCrossings(wires []Wire) error {
	if crossings(wires, mostCrossings) > mostCrossings {
		return refuse("wires", "the wires cross more than %d times; divide the sheet into several", mostCrossings)
	}
	return nil
}

// crossings counts where level and upright stretches of wire meet. When there are so few of them that they cannot meet
// more often than enough, it gives the most that they could. Its cost is O(n log n) in the number of stretches.
func crossings(wires []Wire, enough int) int {
	var level, upright int
	for w := range wires {
		for i := 1; i < len(wires[w].Points); i++ {
			if wires[w].Points[i-1].Y == wires[w].Points[i].Y {
				level++
			} else {
				upright++
			}
		}
	}
	if level*upright <= enough {
		return level * upright
	}
	count := 0
	var rows tally
	for _, e := range sweep(wires) {
		switch e.what {
		case begins:
			rows.add(e.low, 1)
		case crosses:
			count += rows.upTo(e.high) - rows.upTo(e.low-1)
		case ends:
			rows.add(e.low, -1)
		}
	}
	return count
}

// event is what a line meets that sweeps over a sheet from left to right.
type event struct {
	x         int
	what      eventKind
	low, high int // the rows of an upright stretch; the row of a level one
}

type eventKind uint8

// The events at one x, in the order in which they count.
const (
	begins  eventKind = iota // a level stretch
	crosses                  // an upright stretch
	ends                     // a level stretch
)

func sweep(wires []Wire) []event {
	var list []event
	for w := range wires {
		for i := 1; i < len(wires[w].Points); i++ {
			a, b := wires[w].Points[i-1], wires[w].Points[i]
			if a.Y == b.Y {
				list = append(list, event{min(a.X, b.X), begins, a.Y, a.Y}, event{max(a.X, b.X), ends, a.Y, a.Y})
			} else {
				list = append(list, event{a.X, crosses, min(a.Y, b.Y), max(a.Y, b.Y)})
			}
		}
	}
	slices.SortFunc(list, func(a, b event) int { return cmp.Or(cmp.Compare(a.x, b.x), cmp.Compare(a.what, b.what)) })
	return list
}

// tally counts level stretches by rows (a binary indexed tree, P. M. Fenwick 1994).
type tally [2*furthest + 2]int

func (t *tally) add(row, by int) {
	for i := row + furthest + 1; i < len(t); i += i & -i {
		t[i] += by
	}
}

// upTo counts the stretches on rows up to one.
func (t *tally) upTo(row int) int {
	count := 0
	for i := row + furthest + 1; i > 0; i -= i & -i {
		count += t[i]
	}
	return count
}
