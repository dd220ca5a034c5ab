package kinds

import (
	"math"
	"math/cmplx"
	"testing"
)

// impedanceOfBranch is −alpha/beta of a branch.
func impedanceOfBranch(law Law) complex128 { return -law.Alpha / law.Beta }

// The resistances are those that tables of IEC 60751 print; 25 °C is computed from its equation.
func TestAPlatinumThermometerHasTheResistancesOfItsStandard(t *testing.T) {
	for temperature, ohms := range map[float64]float64{-50: 80.31, 0: 100, 25: 109.73, 50: 119.40, 100: 138.51, 150: 157.33, 200: 175.86, 400: 247.09} {
		got := real(impedanceOfBranch(law(RTD, Values{"temperature": Number(temperature)}, Condition{})))
		if math.Abs(got-ohms) > 0.005001 {
			t.Errorf("%g Ω at %g °C, the standard has %g", got, temperature, ohms)
		}
	}
}

// X_L = 2πfL and X_C = −1/(2πfC) are textbook formulas. The reactances at 60 Hz of 4.7 µF (564.38 Ω), of 1.5 µF (1.7684 kΩ)
// and of 650 mH (245.04 Ω) are printed by T. R. Kuphaldt, Lessons In Electric Circuits, vol. II, ch. 5 (from memory).
func TestReactancesAreThoseOfTheTextbook(t *testing.T) {
	ac := Condition{System: System{Kind: "ac", Hertz: 60}}
	for _, c := range []struct {
		kind      *Kind
		values    Values
		want      complex128
		tolerance float64
	}{
		{Capacitor, Values{"capacitance": Number(4.7e-6)}, -564.38i, 0.005001},
		{Capacitor, Values{"capacitance": Number(1.5e-6), "esr": Number(2)}, 2 - 1768.4i, 0.05001},
		{Inductor, Values{"inductance": Number(0.65), "resistance": Number(3)}, 3 + 245.04i, 0.005001},
		{FixedImpedance, Values{"resistance": Number(3), "reactance": Number(-4)}, 3 - 4i, 1e-12},
	} {
		if got := impedanceOfBranch(law(c.kind, c.values, ac)); cmplx.Abs(got-c.want) > c.tolerance {
			t.Errorf("%s: %v, want %v", c.kind.Title, got, c.want)
		}
	}
}

func TestOnADCSheetACapacitorIsOpenAndAnInductorIsItsResistance(t *testing.T) {
	dc := Condition{System: System{Kind: "dc"}}
	if got := law(Capacitor, Values{"capacitance": Number(1e-6)}, dc).current(24); got != 0 {
		t.Errorf("a capacitor lets %v A through", got)
	}
	if got := impedanceOfBranch(law(Inductor, Values{"inductance": Number(1), "resistance": Number(7)}, dc)); got != 7 {
		t.Errorf("an inductor of 7 Ω has %v Ω", got)
	}
}

// R = U²/P and the voltage divider are textbook.
func TestAHeaterAndAPotentiometerAreTheirResistances(t *testing.T) {
	if got := law(Heater, Values{"voltage": Number(24), "power": Number(60)}, Condition{}).current(24); cmplx.Abs(got-2.5) > 1e-12 {
		t.Errorf("60 W at 24 V take %v A", got)
	}
	list := Potentiometer.Branches(Potentiometer.Fill(Values{"resistance": Number(1000), "setting": Number(0.2)}), Condition{})
	if upper, lower := impedanceOfBranch(list[0].Law), impedanceOfBranch(list[1].Law); upper != 200 || lower != 800 {
		t.Errorf("set to 0.2, 1 kΩ divides into %v and %v", upper, lower)
	}
}

func TestAnACSupplyFollowsTheSupplyLevelAtItsPhase(t *testing.T) {
	values := Values{"voltage": Number(100), "phase": Number(90), "resistance": Number(3), "reactance": Number(4)}
	for level, volts := range map[Level]float64{Low: 90, Nominal: 100, High: 110} {
		got := law(ACSupply, values, Condition{System: System{Kind: "ac", Hertz: 50}, Supply: level})
		if cmplx.Abs(got.Gamma-complex(0, volts)) > 1e-9 || impedanceOfBranch(got) != 3+4i {
			t.Errorf("%s: %v V behind %v Ω", level, got.Gamma, impedanceOfBranch(got))
		}
	}
	if text := ACSupply.Legend(ACSupply.Fill(values)); text != "100 V ∠ 90°" && text != "100 V ∠ 90 °" {
		t.Errorf("the legend is %q", text)
	}
}
