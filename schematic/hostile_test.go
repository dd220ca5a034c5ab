package schematic_test

import (
	"errors"
	"fmt"
	"strings"
	"testing"

	"loopwright/schematic"
)

// These sheets are small files that would fill the memory if everything on them were put down in a list.

func TestWiresThatLieOnOneAnotherByTheThousandAreJoined(t *testing.T) {
	var chains []string
	for i := range 9000 {
		chains = append(chains, fmt.Sprintf("[%d, 0], [%d, 0]", i-10000, 10000-i))
	}
	sheet := decoded(t, dcSheet(`"parts": [{"ref": "R1", "kind": "resistor", "at": [0, 2]}]`, wiresOf(chains...)))
	if joins := schematic.Join(sheet); joins.Groups != 2 || len(joins.Pieces) != 18000 {
		t.Errorf("%d groups, %d pieces", joins.Groups, len(joins.Pieces))
	}
	_, _, _, err := schematic.Apply(sheet, []schematic.Edit{{Do: "move", Refs: []string{"R1"}, By: schematic.Point{X: 1}}})
	if wrong := (*schematic.PlaceError)(nil); !errors.As(err, &wrong) || wrong.Place != "edits[0]" {
		t.Errorf("error %v", err)
	}
}

func TestAWeaveOfWiresIsRefused(t *testing.T) {
	weave := func(n int) string {
		var chains []string
		for i := range n {
			chains = append(chains, fmt.Sprintf("[-1, %d], [%d, %d]", i, n, i), fmt.Sprintf("[%d, -1], [%d, %d]", i, i, n))
		}
		return dcSheet(wiresOf(chains...))
	}
	if sheet := decoded(t, weave(300)); len(schematic.Join(sheet).Crossings) != 300*300 {
		t.Error("not all crossings are found")
	}
	_, err := schematic.Decode([]byte(weave(5000)))
	if wrong := (*schematic.PlaceError)(nil); !errors.As(err, &wrong) || wrong.Place != "wires" {
		t.Errorf("error %v", err)
	}
}

func TestManyWiresBetweenTheSamePlacesAreToldApart(t *testing.T) {
	var chains []string
	for i := range 9000 {
		chains = append(chains, fmt.Sprintf("[0, 0], [%d, 0], [%d, 5], [0, 5]", i+1, i+1))
	}
	chains = append(chains, "[0, 5], [77, 5], [77, 0], [0, 0]")
	_, err := schematic.Decode([]byte(dcSheet(wiresOf(chains...))))
	if err == nil || !strings.Contains(err.Error(), "wires[9000]: wires[76] is exactly the same") {
		t.Errorf("error %v", err)
	}
}
