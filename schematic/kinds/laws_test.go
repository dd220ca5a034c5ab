package kinds

import (
	"math"
	"math/cmplx"
	"testing"
)

// law is the only branch of a part under a condition.
func law(kind *Kind, values Values, condition Condition) Law {
	return kind.Branches(kind.Fill(values), condition)[0].Law
}

// current is j for a given u by alpha·j + beta·u = gamma.
func (l Law) current(u complex128) complex128 { return (l.Gamma - l.Beta*u) / l.Alpha }

// The signs and formulas are those of the sheet format; Ohm's law and the power law P = U²/R are textbook.
func TestLawsHaveTheSignsOfTheSheetFormat(t *testing.T) {
	dc := Condition{System: System{Kind: "dc"}, Supply: Nominal, Position: Rest}
	at := func(level Level, position string) Condition {
		return Condition{System: System{Kind: "dc"}, Supply: level, Position: position}
	}
	for _, c := range []struct {
		says      string
		kind      *Kind
		values    Values
		condition Condition
		u, j      float64
	}{
		{"a resistor takes u/R", Resistor, Values{"resistance": Number(100)}, dc, 5, 0.05},
		{"a lamp takes its rated power at its rated voltage", Lamp, nil, dc, 24, 2.0 / 24},
		{"a supply of 24 V and 0.5 Ω pressed down to 23 V delivers 2 A", DCSupply, Values{"resistance": Number(0.5)}, dc, 23, -2},
		{"a supply at its low limit has 10 % less", DCSupply, Values{"resistance": Number(1)}, at(Low, Rest), 21.6, 0},
		{"a supply at its high limit has 10 % more", DCSupply, Values{"resistance": Number(1)}, at(High, Rest), 26.4, 0},
		{"limits that are given hold", DCSupply, Values{"resistance": Number(1), "low": Number(20)}, at(Low, Rest), 20, 0},
		{"a battery at its low limit has 15 % less", Battery, nil, at(Low, Rest), 10.2, 0},
		{"a battery at its high limit has 15 % more", Battery, nil, at(High, Rest), 13.8, 0},
		{"an ideal source does not follow the supply level", VoltageSource, Values{"voltage": Number(10), "resistance": Number(1)}, at(Low, Rest), 10, 0},
		{"a current source drives out of pin 1", CurrentSource, Values{"current": Number(0.02)}, dc, 7, -0.02},
		{"a make contact is open at rest", Switch, nil, dc, 24, 0},
		{"a make contact closes when operated", Switch, nil, at(Nominal, Operated), 0.02, 1},
		{"a break contact opens when operated", Switch, Values{"form": Word(Choice, "break")}, at(Nominal, Operated), 24, 0},
		{"an open contact leaks", Switch, Values{"leakage": Number(0.001)}, dc, 12, 0.0005},
		{"a fuse conducts", Fuse, nil, dc, 0.05, 1},
		{"an operated fuse is open", Fuse, nil, at(Nominal, Operated), 24, 0},
		{"a blown fuse is open at rest too", Fuse, Values{"blown": {Form: Flag, Yes: true}}, dc, 24, 0},
		{"a voltmeter is its input resistance", Voltmeter, nil, dc, 10, 1e-6},
		{"an ammeter is its shunt", Ammeter, nil, dc, 0.1, 1},
	} {
		got := law(c.kind, c.values, c.condition).current(complex(c.u, 0))
		if cmplx.Abs(got-complex(c.j, 0)) > 1e-12 {
			t.Errorf("%s: j = %v at u = %g, want %g", c.says, got, c.u, c.j)
		}
	}
}

func TestASwitchWithNamedPositionsConductsWhereItIsSaidTo(t *testing.T) {
	values := Values{
		"positions": {Form: Names, Names: []string{"Hand", "Off", "Auto"}},
		"closed_in": {Form: Names, Names: []string{"Hand", "Auto"}},
	}
	for position, closed := range map[string]bool{"Hand": true, "Off": false, "Auto": true} {
		if got := Switch.Closed(Switch.Fill(values), position); got != closed {
			t.Errorf("%s: closed is %v", position, got)
		}
	}
}

func TestASourceOfAPhaseIsAPhasor(t *testing.T) {
	ac := Condition{System: System{Kind: "ac", Hertz: 50}, Supply: Nominal, Position: Rest}
	got := law(VoltageSource, Values{"voltage": Number(10), "phase": Number(90)}, ac).Gamma
	if cmplx.Abs(got-10i) > 1e-12 {
		t.Errorf("10 V at 90° is %v", got)
	}
	if got := law(CurrentSource, Values{"current": Number(2), "phase": Number(-60)}, ac).Gamma; math.Abs(cmplx.Phase(-got)+math.Pi/3) > 1e-12 {
		t.Errorf("2 A at −60° is %v", -got)
	}
}
