package quantity_test

import (
	"math"
	"testing"

	"loopwright/schematic/quantity"
)

// SI Brochure, 9th edition: a space parts number and unit, also before % (sections 5.4.3, 5.4.7) and °C, but not before
// the degree of angle. The minus sign of print is that of ISO 80000-2. Both from memory.
func TestFormatWritesEngineeringNotation(t *testing.T) {
	for _, test := range []struct {
		value  float64
		unit   quantity.Unit
		digits int
		want   string
	}{
		{0.2441, quantity.Ampere, 4, "244.1 mA"}, {24, quantity.Volt, 4, "24.00 V"}, {-24, quantity.Volt, 4, "\u221224.00 V"},
		{0, quantity.Ampere, 4, "0 A"}, {math.Copysign(0, -1), quantity.Volt, 4, "0 V"}, {1, quantity.Volt, 1, "1 V"},
		{0.99996, quantity.Ampere, 4, "1.000 A"}, {0.99994, quantity.Ampere, 4, "999.9 mA"}, {999.96, quantity.Ohm, 4, "1.000 kΩ"},
		{9.9996, quantity.Ohm, 4, "10.00 Ω"}, {4700, quantity.Ohm, 2, "4.7 kΩ"}, {244, quantity.Ohm, 1, "200 Ω"}, {245, quantity.Ohm, 2, "240 Ω"},
		{1e-12, quantity.Farad, 3, "1.00 pF"}, {4.7e-9, quantity.Farad, 2, "4.7 nF"}, {4.7e-6, quantity.Farad, 2, "4.7 µF"},
		{0.01, quantity.Henry, 3, "10.0 mH"}, {2e6, quantity.Watt, 3, "2.00 MW"}, {3e9, quantity.Hertz, 3, "3.00 GHz"}, {4e14, quantity.Ohm, 3, "400 TΩ"},
		{1e15, quantity.Ohm, 3, "1.00e15 Ω"}, {9.9999e14, quantity.Ohm, 3, "1.00e15 Ω"}, {1e-15, quantity.Ampere, 4, "1.000e\u221215 A"},
		{-2e-13, quantity.Ampere, 2, "\u2212200e\u221215 A"}, {1200, quantity.Metre, 3, "1.20 km"}, {0.25, quantity.Second, 3, "250 ms"},
		{3e-7, quantity.FaradPerKilometre, 3, "300 nF/km"}, {1600, quantity.VoltAmpere, 2, "1.6 kVA"}, {1500, quantity.Var, 2, "1.5 kvar"}, {0.005, quantity.Siemens, 1, "5 mS"},
		{12.3456, quantity.Percent, 4, "12.35 %"}, {5, quantity.Percent, 4, "5 %"}, {-5, quantity.Celsius, 4, "\u22125 °C"}, {45, quantity.Degree, 3, "45°"},
		{0.75, quantity.SquareMillimetre, 3, "0.75 mm²"}, {1200, quantity.None, 4, "1200"}, {123456, quantity.None, 4, "123500"},
		{0.00123, quantity.None, 4, "0.00123"}, {1.5e-5, quantity.None, 3, "15e\u22126"}, {2e15, quantity.None, 3, "2e15"}, {99.996, quantity.Percent, 4, "100 %"},
		{18, quantity.Gauge, 4, "18 AWG"}, {-1, quantity.Gauge, 4, "2/0 AWG"}, {0, quantity.Gauge, 4, "1/0 AWG"},
		{math.NaN(), quantity.Volt, 4, "—"}, {math.Inf(-1), quantity.None, 4, "—"},
		{1.0 / 3, quantity.Volt, 0, "300 mV"}, {1.0 / 3, quantity.Volt, 99, "333.33333333333331 mV"},
	} {
		if got := quantity.Format(test.value, test.unit, test.digits); got != test.want {
			t.Errorf("Format(%v, %q, %d) = %q, want %q", test.value, test.unit, test.digits, got, test.want)
		}
	}
}

func TestExactWritesAsFewDigitsAsReadBack(t *testing.T) {
	for _, test := range []struct {
		value float64
		unit  quantity.Unit
		want  string
	}{
		{4700, quantity.Ohm, "4.7 kΩ"}, {24, quantity.Volt, "24 V"}, {-24, quantity.Volt, "-24 V"}, {0.75, quantity.SquareMillimetre, "0.75 mm²"},
		{5, quantity.Percent, "5 %"}, {18, quantity.Gauge, "18 AWG"}, {-3, quantity.Gauge, "4/0 AWG"}, {0, quantity.Gauge, "1/0 AWG"}, {-4, quantity.Gauge, "-4 AWG"},
		{math.Copysign(0, -1), quantity.Ohm, "0 Ω"}, {0.3e-6, quantity.FaradPerKilometre, "300 nF/km"}, {80, quantity.Metre, "80 m"}, {0.08, quantity.Metre, "80 mm"},
		{0.30000000000000004, quantity.Ampere, "300.00000000000004 mA"}, {120, quantity.Degree, "120°"}, {1e6, quantity.None, "1000000"}, {0.012, quantity.None, "0.012"},
		{1e-15, quantity.Ampere, "1e-15 A"}, {math.MaxFloat64, quantity.Volt, "179.76931348623157e306 V"}, {5e-324, quantity.Volt, "5e-324 V"},
		{math.Inf(1), quantity.Volt, "—"}, {math.NaN(), quantity.Gauge, "—"},
	} {
		if got := quantity.Exact(test.value, test.unit); got != test.want {
			t.Errorf("Exact(%v, %q) = %q, want %q", test.value, test.unit, got, test.want)
		}
	}
}

func TestAppendKeepsWhatIsThereAndAllocatesNothing(t *testing.T) {
	buffer := make([]byte, 0, 64)
	if got := string(quantity.Append(append(buffer, "I = "...), 0.2441, quantity.Ampere, 4)); got != "I = 244.1 mA" {
		t.Errorf("got %q", got)
	}
	allocations := testing.AllocsPerRun(100, func() { quantity.Append(buffer, -0.2441, quantity.Ampere, 4) })
	if allocations != 0 {
		t.Errorf("%v allocations", allocations)
	}
}
