// Package kinds holds what Loopwright knows of each kind of part: its pins, its values with their units and bounds, its
// symbol, the branches that it puts into the circuit, and its place in the tray. Each kind is one file, which registers
// itself; nothing else has to change when a kind is added.
//
// Signs, everywhere: a branch runs from its first pin to its second, its voltage is v(first) − v(second), its current
// is positive when it enters the first pin, and its power is absorbed power.
package kinds

import (
	"cmp"
	"fmt"
	"slices"

	"loopwright/schematic/stroke"
)

// Kind is everything that is known of one kind of part.
type Kind struct {
	Name   string   // as in sheet files: "dc-supply"
	Title  string   // as people say it, in lower case: "DC supply"
	Group  Group    // where it lies in the tray
	Order  int      // its place within the group, ascending
	Letter string   // first letters of its reference designation, after IEC 81346-2
	Words  []string // other words under which it is found in the tray
	Pins   []Pin
	Specs  []Spec
	Tray   []Entry // how it is offered in the tray, at least one entry

	// Symbol draws the part at the origin, not turned; all pins lie on its lines' ends. Shapes follow IEC 60617 or
	// IEEE 315, in our own geometry; their descriptions are from memory.
	Symbol func(Look) stroke.List
	// Branches gives the branches of the part under the condition of a case, always the same number in the same order.
	// It is nil for kinds that only join or name potentials.
	Branches func(Filled, Condition) []Branch
	// Legend is the line of values that stands beside the symbol: "24 V 2 W". It may be empty.
	Legend func(Filled) string

	// Positions lists where the part can stand, rest first; nil when nothing can be operated.
	Positions func(Filled) []string
	// Closed reports whether the part conducts in a position; nil for kinds without positions.
	Closed func(Filled, string) bool
	// Joins gives the name of the potential that the part's pin belongs to; nil for all but potential and earth.
	Joins func(Filled) string
	// Check refuses values that make no sense together, or in the given system; it may be nil. The error names the
	// value first: "resistance: …".
	Check func(Filled, System) error

	// Delivers marks sources: on the sheet, their current is shown as they deliver it.
	Delivers bool
	// Follows marks the supplies that follow the supply level of the case.
	Follows bool
	// SameConductor marks kinds through which a wire number passes unchanged: cable, ammeter, terminal.
	SameConductor bool
	// DCOnly marks kinds that a phasor solution cannot hold; an AC sheet refuses them.
	DCOnly bool
	// ACOnly marks kinds that do nothing where nothing alternates; a DC sheet refuses them.
	ACOnly bool
	// Ratings are what the part is rated for, as far as a value tells it.
	Ratings []Rating
}

// Rated is what a rating limits.
type Rated uint8

// A rating limits the current through the part or the power that it takes.
const (
	OfCurrent Rated = iota
	OfPower
)

// Rating says that a value of the part is the most that it may carry for long.
type Rating struct {
	Of    Rated
	Value string // name of the Spec that holds the limit
}

// Pin is a connection point of a kind.
type Pin struct {
	Name string // "1", "A1"
	X, Y int    // from the part's origin before turning, in grid steps
	Mark string // what is printed at the pin: "+" at the positive pin of a source; empty for none
}

// Entry is one way in which a kind is offered in the tray.
type Entry struct {
	Title  string // one or two words: "Break"
	Values Values // the values that the part starts with beside its defaults
}

// Group is a section of the tray.
type Group string

// The sections of the tray, in order.
const (
	Supply  Group = "Supply"
	Protect Group = "Protect"
	Operate Group = "Operate"
	Load    Group = "Load"
	Wiring  Group = "Wiring"
	Measure Group = "Measure"
)

// Groups lists the sections of the tray from left to right.
func Groups() []Group { return []Group{Supply, Protect, Operate, Load, Wiring, Measure} }

// SymbolSet chooses between the symbols of IEC 60617 and those of IEEE 315 / NFPA 79.
type SymbolSet string

// The two symbol sets.
const (
	IEC  SymbolSet = "iec"
	ANSI SymbolSet = "ansi"
)

// Look is what the symbol of a part depends on.
type Look struct {
	Values   Filled
	Set      SymbolSet
	Position string // where it stands in the shown case
	Closed   bool   // whether it conducts in the shown case
	Turn     int    // how the part lies on the sheet, for signs that stay upright within the symbol
	Flip     bool
}

// System is the electrical system of a sheet.
type System struct {
	Kind  string // "dc" or "ac"
	Hertz float64
}

// AC reports whether the sheet is solved with phasors.
func (s System) AC() bool { return s.Kind == "ac" }

// Level is where the supplies of a case stand between their limits.
type Level string

// The supply levels.
const (
	Low     Level = "low"
	Nominal Level = "nominal"
	High    Level = "high"
)

// Condition is the state in which a part finds itself in a case.
type Condition struct {
	System   System
	Supply   Level
	Position string
}

// The positions of a part that has no named ones.
const (
	Rest     = "rest"
	Operated = "operated"
)

// Branch is one element of the circuit between two pins of a part.
type Branch struct {
	From, To string // names of pins
	Law      Law
}

// Law says how current and voltage of a branch depend on one another:
//
//	Alpha·j + Beta·u = Gamma
//
// with u = v(From) − v(To) in volts and j the current from From to To through the branch in amperes (root mean square
// phasors in AC). Row asks the solver to keep the branch's own equation in every case, since a switch may open it.
type Law struct {
	Alpha, Beta, Gamma complex128
	Row                bool
}

// Impedance is the law u = impedance·j + emf, in ohms and volts.
func Impedance(impedance, emf complex128) Law {
	return Law{Alpha: -impedance, Beta: 1, Gamma: emf}
}

// Current is the law of a source that drives a current, in amperes, from its first pin to its second through itself.
func Current(amperes complex128) Law { return Law{Alpha: 1, Gamma: amperes, Row: true} }

// Contact is the law of a part that a switch, fuse or breaker may open: closed it has a resistance, open it leaks
// through a conductance (in siemens, 0 for none).
func Contact(closed bool, resistance, leakage float64) Law {
	if closed {
		return Law{Alpha: complex(-resistance, 0), Beta: 1, Row: true}
	}
	return Law{Alpha: 1, Beta: complex(-leakage, 0), Row: true}
}

var registry = map[string]*Kind{}

// register adds a kind and checks, when the program starts, that it is whole.
func register(kind *Kind) *Kind {
	if _, taken := registry[kind.Name]; taken {
		panic("kinds: " + kind.Name + " is registered twice")
	}
	registry[kind.Name] = kind
	return kind
}

// All lists the kinds in the order of the tray.
func All() []*Kind {
	list := make([]*Kind, 0, len(registry))
	for _, kind := range registry {
		list = append(list, kind)
	}
	groups := Groups()
	slices.SortFunc(list, func(a, b *Kind) int {
		return cmp.Or(cmp.Compare(slices.Index(groups, a.Group), slices.Index(groups, b.Group)),
			cmp.Compare(a.Order, b.Order), cmp.Compare(a.Name, b.Name))
	})
	return list
}

// Lookup finds a kind by its name in sheet files. The error is a sentence that says whether the kind does not exist or
// is not built yet.
func Lookup(name string) (*Kind, error) {
	if kind, ok := registry[name]; ok {
		return kind, nil
	}
	if slices.Contains(planned, name) {
		return nil, fmt.Errorf("the kind %q is not built yet; leave the part out or use another kind", name)
	}
	return nil, fmt.Errorf("there is no kind %q; the tray lists the kinds", name)
}

// planned are the kinds of the sheet format that this version cannot solve yet.
var planned = []string{
	"transmitter", "vcvs", "ccvs", "vccs", "cccs",
	"indicator", "coil", "valve", "input", "load", "contact", "changeover", "breaker", "cable",
	"cable-pair", "diode", "led", "zener", "transformer",
}

// Pin finds a pin by its name.
func (k *Kind) Pin(name string) (Pin, bool) {
	for _, pin := range k.Pins {
		if pin.Name == name {
			return pin, true
		}
	}
	return Pin{}, false
}

// Spec finds the description of a value by its name.
func (k *Kind) Spec(name string) (Spec, bool) {
	for _, spec := range k.Specs {
		if spec.Name == name {
			return spec, true
		}
	}
	return Spec{}, false
}

// twoPins are the pins of nearly every kind: 1 above, 2 below.
func twoPins(firstMark string) []Pin {
	return []Pin{{Name: "1", X: 0, Y: -2, Mark: firstMark}, {Name: "2", X: 0, Y: 2}}
}
