package trace_test

import (
	"testing"

	"loopwright/schematic"
	"loopwright/schematic/kinds"
	"loopwright/schematic/sheettest"
	"loopwright/schematic/trace"
)

// numbers writes the potentials of a drawing: "1/1 L+ G1:1 R1:1", number, wire number, name and pins.
func numbers(d *trace.Drawing) []string {
	var list []string
	for _, p := range d.Potentials {
		text := p.Number + "/" + p.WireNumber + " " + p.Name
		for _, pin := range p.Pins {
			text += " " + pin
		}
		list = append(list, text)
	}
	return list
}

func TestPotentialsAreNumberedInReadingOrder(t *testing.T) {
	b := sheettest.NewBuilder("Window")
	window(b)
	expect(t, "potentials", numbers(trace.Trace(b.Sheet)),
		"0/0  G1:2 R2:2 R4:2", // the second pin of the first source
		"1/1  R1:1 G1:1",      // met first, at the top left
		"2/2  R1:2 R3:1 R2:1",
		"3/3  R3:2 R4:1")
}

func TestAPotentialIsNumberedByItsTopmostPlaceEvenWhenThatIsNoPin(t *testing.T) {
	b := sheettest.NewBuilder("A wire that goes up")
	b.Down(kinds.DCSupply, nil, 0, 0, false)
	b.Wire(b.Node(0, 1), b.Node(1, 1))
	b.Down(kinds.Resistor, nil, 1, 0, false)
	b.Down(kinds.Resistor, nil, 2, 0, false)
	b.Wire(b.Node(2, 1), b.Node(3, 1), schematic.Point{X: 18, Y: -6}) // above all others
	expect(t, "potentials", numbers(trace.Trace(b.Sheet)),
		"0/0  G1:2 R1:2", "1/1  R2:2", "2/2  G1:1", "3/3  R1:1", "4/4  R2:1")
}

func TestAWireNumberPassesThroughAnAmmeter(t *testing.T) {
	b := sheettest.NewBuilder("Ammeter")
	b.Down(kinds.DCSupply, nil, 0, 0, false)
	b.Right(kinds.Ammeter, nil, 0, 0, true)
	b.Right(kinds.Ammeter, nil, 1, 0, false)
	b.Right(kinds.Fuse, nil, 2, 0, false)
	expect(t, "potentials", numbers(trace.Trace(b.Sheet)),
		"0/0  G1:2", "1/1  P1:2 G1:1", "2/1  P1:1 P2:1", "3/1  P2:2 F1:1", "4/4  F1:2")
}

func TestTheReferenceIsFoundByNameOrPin(t *testing.T) {
	b := sheettest.NewBuilder("References")
	window(b)
	b.Part(kinds.Potential, named("common"), b.Node(1, 1), 180)
	b.Part(kinds.Earth, named("PE"), b.Node(2, 0), 0)
	for _, test := range []struct{ reference, number0, said string }{
		{"", "0/0 common G1:2 R2:2 R4:2 V1:1", ""},
		{"common", "0/0 common G1:2 R2:2 R4:2 V1:1", ""},
		{"PE", "0/0 PE R3:2 XE1:1 R4:1", ""},
		{"R1:2", "0/0  R1:2 R3:1 R2:1", ""},
		{"G1:1", "0/0  R1:1 G1:1", ""},
		{"R1:7", "0/0 common G1:2 R2:2 R4:2 V1:1", "The reference R1:7 is not on the sheet; the potential of -G1:2 is taken as 0 V."},
		{"0V", "0/0 common G1:2 R2:2 R4:2 V1:1", "The reference 0V is not on the sheet; the potential of -G1:2 is taken as 0 V."},
	} {
		b.Sheet.Reference = test.reference
		d := trace.Trace(b.Sheet)
		expect(t, test.reference, numbers(d)[:1], test.number0)
		said := ""
		for _, statement := range d.Statements {
			said += statement.Says
		}
		if said != test.said || d.Reference != 0 {
			t.Errorf("%s: said %q, want %q", test.reference, said, test.said)
		}
	}
	without := sheettest.NewBuilder("No source")
	without.Down(kinds.Resistor, nil, 0, 0, false)
	expect(t, "no source", numbers(trace.Trace(without.Sheet)), "0/0  R1:1", "1/1  R1:2")
}

func TestOneNameIsOnePotential(t *testing.T) {
	b := sheettest.NewBuilder("Names")
	b.Down(kinds.Resistor, nil, 0, 0, false)
	b.Down(kinds.Resistor, nil, 1, 0, false)
	b.Part(kinds.Potential, named("0V"), b.Node(0, 1), 0)
	b.Part(kinds.Earth, named("0V"), b.Node(1, 1), 0)
	b.Part(kinds.Potential, named("unused"), schematic.Point{X: 30, Y: 0}, 0)
	b.Part(kinds.Terminal, nil, schematic.Point{X: 36, Y: 0}, 0)
	d := trace.Trace(b.Sheet)
	expect(t, "potentials", numbers(d), "0/0  R1:1", "1/1  R2:1", "2/2 unused V2:1", "3/3  X1:1", "4/4 0V R1:2 R2:2 V1:1 XE1:1")
}

// sayings lists the statements of a drawing with their rules.
func sayings(d *trace.Drawing) []string {
	var list []string
	for _, statement := range d.Statements {
		list = append(list, statement.Rule+": "+statement.Says)
	}
	return list
}

func TestWhatHangsFreeIsSaid(t *testing.T) {
	b := sheettest.NewBuilder("Free")
	window(b)
	expect(t, "a closed circuit", sayings(trace.Trace(b.Sheet)))
	b.Part(kinds.Potential, nil, schematic.Point{X: 60, Y: 60}, 0)
	b.Part(kinds.Terminal, nil, schematic.Point{X: 66, Y: 60}, 0)
	expect(t, "a potential and a terminal alone", sayings(trace.Trace(b.Sheet)))
	b.Part(kinds.Resistor, nil, schematic.Point{X: 40, Y: 10}, 0)
	b.Wire(schematic.Point{X: 40, Y: 12}, schematic.Point{X: 44, Y: 12})
	b.Wire(b.Node(1, 1), schematic.Point{X: 6, Y: 9})
	d := trace.Trace(b.Sheet)
	expect(t, "an open pin and two ends", sayings(d),
		"open-pin: -R5:1 is joined to nothing.",
		"dangling-end: A wire of potential 5 ends at nothing.",
		"dangling-end: A wire of potential 0 ends at nothing.",
		"floating: -R5 has no connection to the reference potential 0, so that voltages to it are not defined there.")
	if at := d.Statements[1].At; *at != (schematic.Point{X: 44, Y: 12}) || d.Statements[1].Wire != b.Sheet.Wires[len(b.Sheet.Wires)-2].ID {
		t.Errorf("%+v", d.Statements[1])
	}
}

func TestNamesThatAreJoinedAreSaid(t *testing.T) {
	b := sheettest.NewBuilder("Joined names")
	window(b)
	b.Part(kinds.Potential, named("0V"), b.Node(0, 1), 180)
	b.Part(kinds.Earth, named("PE"), b.Node(1, 1), 0)
	b.Part(kinds.Potential, named("0V"), b.Node(2, 1), 180)
	expect(t, "earthed on purpose", sayings(trace.Trace(b.Sheet)))
	b.Part(kinds.Potential, named("M"), b.Node(1, 1), 180)
	d := trace.Trace(b.Sheet)
	expect(t, "two names", sayings(d), "two-names: 0V and M are joined and are one potential.")
	expect(t, "the first name counts", []string{d.Potentials[0].Name}, "0V")
}
