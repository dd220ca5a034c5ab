package cases_test

import (
	"slices"
	"strings"
	"testing"

	"loopwright/schematic"
	"loopwright/schematic/kinds"
	"loopwright/schematic/sheettest"
)

func TestEquationsAreWrittenAsOneWouldByHand(t *testing.T) {
	for _, test := range []struct {
		sheet string
		want  []string
	}{
		{"kuphaldt-two-battery-mesh", []string{
			"m1: −E(B1) + R(R1)·i1 + R(R2)·(i1 − i2) = 0", "−28 + 4·i1 + 2·(i1 − i2) = 0",
			"m2: E(B2) + R(R2)·(i2 − i1) + R(R3)·i2 = 0", "7 + 2·(i2 − i1) + 1·i2 = 0",
		}},
		{"broderick-current-source-outside", []string{
			"m1: −E(VS) + R(R1)·i1 + R(R2)·(i1 − i2) = 0", "−10 + 4·i1 + 6·(i1 − i2) = 0",
			"m2: i2 = −J(IS)", "i2 = −5",
		}},
		{"broderick-supermesh-two-mesh-20v", []string{
			"m1, m2: −E(VS) + R(R1)·i1 + R(R3)·i2 + R(R4)·i2 = 0", "−20 + 6·i1 + 10·i2 + 4·i2 = 0",
			"m1, m2: i1 − i2 = −J(IS)", "i1 − i2 = −6",
		}},
		{"nilsson-ap-4-12-supermesh", []string{
			"m1: −E(V6) + R(R1)·i1 + R(R2b)·(i1 − i3) + R(R2a)·(i1 − i2) = 0", "−6 + 1·i1 + 2·(i1 − i3) + 2·(i1 − i2) = 0",
			"m2, m3: −E(V10) + R(R2a)·(i2 − i1) + R(R2b)·(i3 − i1) + R(R2c)·i3 = 0", "−10 + 2·(i2 − i1) + 2·(i3 − i1) + 2·i3 = 0",
			"m2, m3: i2 − i3 = J(I2)", "i2 − i3 = 2",
		}},
	} {
		checkEquations(t, read(t, "../../testdata/examples/"+test.sheet+".sheet.json"), test.want)
	}
}

func checkEquations(t *testing.T, sheet *schematic.Sheet, want []string) {
	t.Helper()
	var got []string
	for _, equation := range solve(t, sheet).Cases[0].Equations {
		got = append(got, strings.Join(equation.Of, ", ")+": "+equation.Symbols, equation.Numbers)
	}
	if !slices.Equal(got, want) {
		t.Errorf("%s\n got %s\nwant %s", sheet.Title, strings.Join(got, "\n     "), strings.Join(want, "\n     "))
	}
}

func TestAnOpenContactFusesItsMeshes(t *testing.T) {
	b := sheettest.NewBuilder("Open contact between two meshes")
	b.Down(kinds.DCSupply, values("resistance", 2), 0, 0, false)
	b.Right(kinds.Resistor, values("resistance", 4700), 0, 0, false)
	b.Down(kinds.Switch, nil, 1, 0, false)
	b.Right(kinds.Resistor, values("resistance", 10_000_000), 1, 0, false)
	b.Down(kinds.Resistor, values("resistance", 123_456), 2, 0, false)
	b.Wire(b.Node(0, 1), b.Node(1, 1))
	b.Wire(b.Node(1, 1), b.Node(2, 1))
	checkEquations(t, b.Sheet, []string{
		"m1, m2: −E(G1) + R(G1)·i1 + R(R1)·i1 + R(R2)·i2 + R(R3)·i2 = 0", "−24 + 2·i1 + 4700·i1 + 10⁷·i2 + 123500·i2 = 0",
		"m1, m2: i1 − i2 = 0 (S1 open)", "i1 − i2 = 0",
	})
	supermeshes := solve(t, b.Sheet).Cases[0].Supermeshes
	if len(supermeshes) != 1 || !slices.Equal(supermeshes[0].Meshes, []int{0, 1}) || !slices.Equal(supermeshes[0].Through, []int{2}) {
		t.Errorf("%+v", supermeshes)
	}
}

func TestPhasorsAreWrittenAsComplexNumbers(t *testing.T) {
	b := sheettest.NewBuilder("Two sources in a ring")
	b.Sheet.System = kinds.System{Kind: "ac", Hertz: 50}
	b.Down(kinds.VoltageSource, values("voltage", 10, "phase", 60), 0, 0, false)
	b.Right(kinds.VoltageSource, values("voltage", 5, "phase", 90), 0, 0, false)
	b.Down(kinds.Resistor, values("resistance", 5), 1, 0, false)
	b.Wire(b.Node(0, 1), b.Node(1, 1))
	// 10∠60° is 5 + j8.66; the other source lies against it.
	checkEquations(t, b.Sheet, []string{
		"m1: −E(G1) + E(G2) + Z(R1)·i1 = 0", "(−5 − j8.66) + j5 + 5·i1 = 0",
	})
}
