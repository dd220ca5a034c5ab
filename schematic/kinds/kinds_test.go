package kinds

import (
	"encoding/json"
	"math"
	"math/cmplx"
	"slices"
	"strings"
	"testing"

	"loopwright/schematic/quantity"
	"loopwright/schematic/stroke"
)

// the kinds that a first sheet needs, with the number of their pins and of their branches.
var first = map[string]struct{ pins, branches int }{
	"voltage-source": {2, 1}, "dc-supply": {2, 1}, "battery": {2, 1}, "current-source": {2, 1}, "resistor": {2, 1},
	"lamp": {2, 1}, "switch": {2, 1}, "fuse": {2, 1}, "voltmeter": {2, 1}, "ammeter": {2, 1},
	"ac-supply": {2, 1}, "capacitor": {2, 1}, "inductor": {2, 1}, "impedance": {2, 1}, "heater": {2, 1}, "rtd": {2, 1},
	"potentiometer": {3, 2},
	"terminal":      {1, 0}, "potential": {1, 0}, "earth": {1, 0},
}

func TestEveryKindIsWhole(t *testing.T) {
	if len(All()) != len(first) {
		t.Errorf("%d kinds are registered, the table holds %d", len(All()), len(first))
	}
	for _, kind := range All() {
		t.Run(kind.Name, func(t *testing.T) {
			want, known := first[kind.Name]
			if !known {
				t.Fatal("the kind is not in the table of this test")
			}
			if len(kind.Pins) != want.pins {
				t.Errorf("%d pins, want %d", len(kind.Pins), want.pins)
			}
			if kind.Title == "" || kind.Letter == "" || len(kind.Words) == 0 || !slices.Contains(Groups(), kind.Group) {
				t.Errorf("title %q, letter %q, words %q or group %q is missing", kind.Title, kind.Letter, kind.Words, kind.Group)
			}
			if kind.Legend == nil || kind.Symbol == nil {
				t.Fatal("the legend or the symbol is missing")
			}
			checkSpecs(t, kind)
			checkTray(t, kind, want.branches)
		})
	}
}

func checkSpecs(t *testing.T, kind *Kind) {
	for _, spec := range kind.Specs {
		if spec.Title == "" || spec.Title != strings.TrimSpace(spec.Title) {
			t.Errorf("%s has the title %q", spec.Name, spec.Title)
		}
		switch spec.Form {
		case Quantity:
			if spec.Least == 0 && spec.Most == 0 && !spec.Positive {
				t.Errorf("%s has no bounds", spec.Name)
			}
			if spec.Unit == quantity.None && spec.Name != "cold_ratio" && spec.Name != "setting" {
				t.Errorf("%s has no unit", spec.Name)
			}
			if !spec.Required && !spec.Optional {
				if _, err := spec.Read(spec.Default.Number); err != nil {
					t.Errorf("%s: the default is refused: %v", spec.Name, err)
				}
			}
		case Choice:
			if !slices.Contains(spec.Choices, spec.Default.Written) {
				t.Errorf("%s: the default %q is no choice", spec.Name, spec.Default.Written)
			}
		}
	}
	for _, rating := range kind.Ratings {
		if _, ok := kind.Spec(rating.Value); !ok {
			t.Errorf("the rating %q is no value", rating.Value)
		}
	}
}

// systemOf is a system in which a kind has its place.
func systemOf(kind *Kind) System {
	if kind.ACOnly {
		return System{Kind: "ac", Hertz: 50}
	}
	return System{Kind: "dc"}
}

// checkTray holds that a part works as the tray puts it down: all required values given, nothing refused, branches that
// join its own pins by finite laws, a symbol that reaches its pins in every position.
func checkTray(t *testing.T, kind *Kind, branches int) {
	if len(kind.Tray) == 0 {
		t.Error("the tray does not offer it")
	}
	for _, entry := range kind.Tray {
		if entry.Title == "" {
			t.Error("an entry of the tray has no title")
		}
		filled := kind.Fill(entry.Values)
		for _, spec := range kind.Specs {
			if spec.Required && !filled.Has(spec.Name) {
				t.Errorf("%s: the tray leaves out %s", entry.Title, spec.Name)
			}
		}
		if kind.Check != nil {
			if err := kind.Check(filled, systemOf(kind)); err != nil {
				t.Errorf("%s: refused: %v", entry.Title, err)
			}
		}
		positions := []string{Rest}
		if kind.Positions != nil {
			positions = kind.Positions(filled)
		}
		for _, position := range positions {
			checkBranches(t, kind, filled, position, branches)
			for _, set := range []SymbolSet{IEC, ANSI} {
				closed := kind.Closed == nil || kind.Closed(filled, position)
				checkSymbol(t, kind, Look{Values: filled, Set: set, Position: position, Closed: closed})
			}
		}
	}
}

func checkBranches(t *testing.T, kind *Kind, filled Filled, position string, want int) {
	if kind.Branches == nil {
		if want != 0 {
			t.Error("no branches")
		}
		return
	}
	for _, level := range []Level{Low, Nominal, High} {
		list := kind.Branches(filled, Condition{System: systemOf(kind), Supply: level, Position: position})
		if len(list) != want {
			t.Errorf("%d branches, want %d", len(list), want)
		}
		for _, branch := range list {
			_, from := kind.Pin(branch.From)
			_, to := kind.Pin(branch.To)
			if !from || !to {
				t.Errorf("the branch %s–%s does not join pins", branch.From, branch.To)
			}
			size := cmplx.Abs(branch.Law.Alpha) + cmplx.Abs(branch.Law.Beta)
			if size == 0 || math.IsNaN(size+cmplx.Abs(branch.Law.Gamma)) || math.IsInf(size, 0) {
				t.Errorf("the law %+v says nothing", branch.Law)
			}
		}
	}
}

// checkSymbol holds that every pin lies on the end of a line, or in the middle of a circle that is the whole symbol.
func checkSymbol(t *testing.T, kind *Kind, look Look) {
	list := kind.Symbol(look)
	for _, pin := range kind.Pins {
		at := stroke.Point{X: float64(pin.X), Y: float64(pin.Y)}
		reached := slices.ContainsFunc(list, func(shape stroke.Shape) bool {
			switch s := shape.(type) {
			case stroke.Path:
				return s.Points[0] == at || s.Points[len(s.Points)-1] == at
			case stroke.Circle:
				return s.Center == at && len(list) == 1
			}
			return false
		})
		if !reached {
			t.Errorf("%s, %s: no line ends on pin %s", look.Set, look.Position, pin.Name)
		}
	}
	box, _ := list.Bounds()
	if box.Left < -3 || box.Right > 3 || box.Top < -2 || box.Bottom > 2 {
		t.Errorf("%s, %s: the symbol reaches too far: %+v", look.Set, look.Position, box)
	}
}

func TestEveryValueReadsBackAsItIsWritten(t *testing.T) {
	texts := map[Form]any{Text: "X7", Flag: true, Names: []any{"Off", "Hand"}}
	for _, kind := range All() {
		for _, spec := range kind.Specs {
			inputs := []any{texts[spec.Form]}
			switch spec.Form {
			case Quantity:
				inputs = []any{1.0, "1 " + string(spec.Unit), quantity.Exact(0.5, spec.Unit)}
			case Choice:
				inputs = inputs[:0]
				for _, choice := range spec.Choices {
					inputs = append(inputs, choice)
				}
			}
			for _, input := range inputs {
				value, err := spec.Read(input)
				if err != nil {
					t.Errorf("%s %s: %v is refused: %v", kind.Name, spec.Name, input, err)
					continue
				}
				data, err := json.Marshal(value)
				if err != nil {
					t.Fatal(err)
				}
				var raw any
				if err := json.Unmarshal(data, &raw); err != nil {
					t.Fatal(err)
				}
				if again, err := spec.Read(raw); err != nil || !again.Same(value) {
					t.Errorf("%s %s: %s reads back as %+v, %v", kind.Name, spec.Name, data, again, err)
				}
			}
		}
	}
}

func TestValuesThatMakeNoSenseTogetherAreRefused(t *testing.T) {
	dc, ac := System{Kind: "dc"}, System{Kind: "ac", Hertz: 50}
	for _, c := range []struct {
		kind   *Kind
		values Values
		system System
		place  string // how the refusal begins; empty when there is none
	}{
		{VoltageSource, Values{"voltage": Number(1), "phase": Number(30)}, dc, "phase:"},
		{VoltageSource, Values{"voltage": Number(1), "phase": Number(30)}, ac, ""},
		{CurrentSource, Values{"current": Number(1), "phase": Number(30)}, dc, "phase:"},
		{DCSupply, Values{"current_limit": Number(3)}, dc, "current_limit:"},
		{DCSupply, Values{"low": Number(25)}, dc, "low:"},
		{DCSupply, Values{"high": Number(23)}, dc, "high:"},
		{DCSupply, Values{"low": Number(24), "high": Number(24)}, dc, ""},
		{ACSupply, Values{"low": Number(130)}, ac, "low:"},
		{FixedImpedance, Values{"reactance": Number(3)}, dc, "reactance:"},
		{FixedImpedance, Values{"reactance": Number(3)}, ac, ""},
		{Battery, Values{"low": Number(13)}, dc, "low:"},
		{Lamp, Values{"cold_ratio": Number(0.1)}, dc, "cold_ratio:"},
		{Switch, Values{"drop": Number(2)}, dc, "drop:"},
		{Switch, Values{"positions": {Form: Names, Names: []string{"Off"}}}, dc, "positions:"},
		{Switch, Values{"positions": {Form: Names, Names: []string{"Off", "On"}}, "closed_in": {Form: Names, Names: []string{"Up"}}}, dc, "closed_in[0]:"},
		{Potential, Values{"name": Word(Text, " ")}, dc, "name:"},
		{Earth, Values{"name": Word(Text, "")}, dc, "name:"},
	} {
		err := c.kind.Check(c.kind.Fill(c.values), c.system)
		switch {
		case c.place == "" && err != nil:
			t.Errorf("%s %v on %s: refused: %v", c.kind.Name, c.values, c.system.Kind, err)
		case c.place != "" && (err == nil || !strings.HasPrefix(err.Error(), c.place)):
			t.Errorf("%s %v on %s: %v, want a refusal of %s", c.kind.Name, c.values, c.system.Kind, err, c.place)
		}
	}
}

func TestSuppliesOfDirectVoltageAreForDCSheetsOnly(t *testing.T) {
	for _, kind := range All() {
		if want := kind == DCSupply || kind == Battery; kind.DCOnly != want {
			t.Errorf("%s: DCOnly is %v", kind.Name, kind.DCOnly)
		}
	}
}

func TestAKindThatIsPlannedIsToldFromOneThatIsNot(t *testing.T) {
	if _, err := Lookup("coil"); err == nil || !strings.Contains(err.Error(), "not built yet") {
		t.Errorf("coil: %v", err)
	}
	if _, err := Lookup("no-such-kind"); err == nil || strings.Contains(err.Error(), "not built yet") {
		t.Errorf("no-such-kind: %v", err)
	}
	for _, name := range planned {
		if _, err := Lookup(name); err == nil {
			t.Errorf("%s is planned and built", name)
		}
	}
}
