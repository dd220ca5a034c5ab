package view_test

import (
	"context"
	"os"
	"reflect"
	"regexp"
	"strings"
	"testing"

	"loopwright/schematic"
	"loopwright/schematic/cases"
	"loopwright/schematic/kinds"
	"loopwright/testdata"
	"loopwright/web/view"
)

// solved reads and solves a demo sheet.
func solved(t *testing.T, name string) (*schematic.Sheet, *cases.Result) {
	t.Helper()
	data, err := testdata.Demo.ReadFile("demo/" + name + ".sheet.json")
	if err != nil {
		t.Fatal(err)
	}
	sheet, err := schematic.Decode(data)
	if err != nil {
		t.Fatal(err)
	}
	result, err := cases.Solve(context.Background(), sheet)
	if err != nil {
		t.Fatal(err)
	}
	return sheet, result
}

func TestASupplyThatIsChargedIsSaidToTake(t *testing.T) {
	sheet, result := solved(t, "two-supplies")
	says := map[string]string{}
	for _, reading := range view.BuildMargin(sheet, result, 0).Readings {
		says[reading.Ref] = reading.Pins + " " + reading.Current
	}
	// By hand, with mesh currents i1 and i2 of the two windows: 12.24 i1 − 12.1 i2 = 24.2 and 12.27 i2 − 12.1 i1 = −23.8
	// give i1 = 2.372 A and i2 = 0.3995 A, so that G2 takes current.
	if says["G1"] != "delivers 2.372 A" || says["G2"] != "takes 399.5 mA" {
		t.Errorf("G1 %q, G2 %q", says["G1"], says["G2"])
	}
}

func TestAnOpenContactIsToldAsAConstraint(t *testing.T) {
	sheet, result := solved(t, "two-supplies")
	margin := view.BuildMargin(sheet, result, 1)
	var all []string
	for _, equation := range margin.Equations {
		all = append(all, equation.Symbols)
	}
	if text := strings.Join(all, "\n"); !strings.Contains(text, "i₂ = 0") || !strings.Contains(text, "−E(G1)") {
		t.Errorf("the equations are\n%s", text)
	}
}

func TestTheStripSaysWhatTheSuppliesDeliver(t *testing.T) {
	sheet, result := solved(t, "two-supplies")
	tabs := view.BuildStrip(sheet, result, 2)
	if len(tabs) != 3 || tabs[2].Says != "0 A" || !tabs[2].Shown || tabs[0].Shown {
		t.Errorf("the tabs are %+v", tabs)
	}
}

func TestTheTrayOffersEveryKindOfTheSystemWithASymbol(t *testing.T) {
	for _, system := range []kinds.System{{Kind: "dc"}, {Kind: "ac", Hertz: 50}} {
		offered := map[string]bool{}
		for _, group := range view.BuildTray(system, kinds.IEC) {
			for _, entry := range group.Entries {
				offered[entry.Kind] = true
				if !strings.HasPrefix(entry.Symbol, "<svg") || entry.Title == "" || !strings.Contains(entry.Find, strings.ToLower(entry.Title)) {
					t.Errorf("the entry %+v", entry)
				}
			}
		}
		for _, kind := range kinds.All() {
			want := !(kind.DCOnly && system.AC()) && !(kind.ACOnly && !system.AC())
			if offered[kind.Name] != want {
				t.Errorf("%s: %s is offered: %v, want %v", system.Kind, kind.Name, offered[kind.Name], want)
			}
		}
	}
}

func TestTheCardSaysWhereAPartStandsAndOffersItsOtherPosition(t *testing.T) {
	sheet, result := solved(t, "pump-lamp")
	for ref, want := range map[string]view.State{
		"S1": {Says: "operated", Moves: []view.Move{{Position: "rest", Says: "Release"}}},
		"F1": {Says: "whole", Moves: []view.Move{{Position: "operated", Says: "Blow"}}},
	} {
		if card := view.BuildCard(sheet, result, 1, sheet.Part(ref)); card.State == nil || !reflect.DeepEqual(*card.State, want) {
			t.Errorf("%s: %+v, want %+v", ref, card.State, want)
		}
	}
}

// The list of keys and the table by which the page acts on them must not drift apart.
func TestEveryKeyThatActsIsListed(t *testing.T) {
	source, err := os.ReadFile("../../static/js/keys.js")
	if err != nil {
		t.Fatal(err)
	}
	listed := map[string]bool{}
	for _, group := range view.Keys(true) {
		for _, line := range group.Keys {
			for _, key := range line.Keys {
				listed[strings.ToLower(strings.TrimPrefix(strings.TrimPrefix(key, "Ctrl "), "Shift "))] = true
			}
		}
	}
	same := map[string]string{"escape": "esc", "delete": "del", "backspace": "del", "=": "+", "-": "−", " ": "space", "y": "z"}
	entry := regexp.MustCompile(`(?m)^  (?:'(.+?)'|(\w+)):`)
	found := 0
	for _, match := range entry.FindAllStringSubmatch(string(source), -1) {
		key := strings.ToLower(match[1] + match[2])
		if other, ok := same[key]; ok {
			key = other
		}
		found++
		if !listed[key] {
			t.Errorf("the key %q acts and is not listed", match[1]+match[2])
		}
	}
	if found < 20 {
		t.Errorf("only %d keys were found in the table", found)
	}
}
