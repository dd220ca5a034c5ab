package quantity_test

import (
	"math"
	"strings"
	"testing"

	"loopwright/schematic/quantity"
)

type reading struct {
	text string
	unit quantity.Unit
	want float64
}

func succeed(t *testing.T, table []reading) {
	t.Helper()
	for _, test := range table {
		got, err := quantity.Parse(test.text, test.unit)
		if err != nil {
			t.Errorf("Parse(%q, %q): %v", test.text, test.unit, err)
		} else if got != test.want || math.Signbit(got) != math.Signbit(test.want) {
			t.Errorf("Parse(%q, %q) = %v, want %v", test.text, test.unit, got, test.want)
		}
	}
}

// IEC 60062, letter codes for the values of resistors and capacitors (examples from memory). Writing k for K is common
// practice, no source.
func TestLetterCodesOfIEC60062AreRead(t *testing.T) {
	succeed(t, []reading{
		{"R47", quantity.Ohm, 0.47}, {"4R7", quantity.Ohm, 4.7}, {"47R", quantity.Ohm, 47}, {"470R", quantity.Ohm, 470},
		{"1R0", quantity.Ohm, 1}, {"0R0", quantity.Ohm, 0}, {"K10", quantity.Ohm, 100}, {"4K7", quantity.Ohm, 4700},
		{"4k7", quantity.Ohm, 4700}, {"47K3", quantity.Ohm, 47300}, {"470K", quantity.Ohm, 470e3},
		{"1M", quantity.Ohm, 1e6}, {"2M2", quantity.Ohm, 2.2e6}, {"1G0", quantity.Ohm, 1e9}, {"1T0", quantity.Ohm, 1e12},
		{"p10", quantity.Farad, 0.1e-12}, {"1p5", quantity.Farad, 1.5e-12}, {"100p", quantity.Farad, 100e-12},
		{"n15", quantity.Farad, 0.15e-9}, {"4n7", quantity.Farad, 4.7e-9}, {"100n", quantity.Farad, 100e-9},
		{"4u7", quantity.Farad, 4.7e-6}, {"4\u00b57", quantity.Farad, 4.7e-6}, {"4\u03bc7", quantity.Farad, 4.7e-6},
		{"1m0", quantity.Farad, 1e-3}, {"1F5", quantity.Farad, 1.5},
	})
}

// Common practice, no source.
func TestLetterCodesAreReadAsThePanelTradeStretchesThem(t *testing.T) {
	succeed(t, []reading{
		{"4k7 Ω", quantity.Ohm, 4700}, {"4k7Ω", quantity.Ohm, 4700}, {"4n7F", quantity.Farad, 4.7e-9},
		{"3V3", quantity.Volt, 3.3}, {"5V6", quantity.Volt, 5.6}, {"1A6", quantity.Ampere, 1.6},
		{"10k", quantity.None, 10e3}, {"2k2", quantity.None, 2200}, {"-4k7", quantity.Volt, -4700},
	})
}

// SI Brochure, 9th edition: table 7 for the prefixes, table 4 for the symbols of units (from memory). Capital K for
// kilo, and a prefix without its unit, are common practice, no source.
func TestPrefixesOfTheSIBrochureAreRead(t *testing.T) {
	succeed(t, []reading{
		{"5 pF", quantity.Farad, 5e-12}, {"5 nF", quantity.Farad, 5e-9}, {"5 uF", quantity.Farad, 5e-6},
		{"5 \u00b5F", quantity.Farad, 5e-6}, {"5 \u03bcF", quantity.Farad, 5e-6}, {"5 mF", quantity.Farad, 5e-3},
		{"5 kΩ", quantity.Ohm, 5e3}, {"5 KΩ", quantity.Ohm, 5e3}, {"5 MΩ", quantity.Ohm, 5e6}, {"5 GΩ", quantity.Ohm, 5e9},
		{"5 TΩ", quantity.Ohm, 5e12}, {"15 mA", quantity.Ampere, 0.015}, {"15 MA", quantity.Ampere, 15e6},
		{"5 mW", quantity.Watt, 0.005}, {"5 MW", quantity.Watt, 5e6}, {"500 mV", quantity.Volt, 0.5}, {"5 mS", quantity.Siemens, 0.005},
		{"10 mH", quantity.Henry, 0.01}, {"1 kHz", quantity.Hertz, 1000}, {"1.6 kVA", quantity.VoltAmpere, 1600},
		{"1.5 kvar", quantity.Var, 1500}, {"300 nF/km", quantity.FaradPerKilometre, 300e-9}, {"0.3 µF/km", quantity.FaradPerKilometre, 0.3e-6},
		{"15m", quantity.Ampere, 0.015}, {"15 m", quantity.Ampere, 0.015}, {"300n", quantity.FaradPerKilometre, 300e-9},
	})
}

func TestEachUnitIsReadInItsSpellings(t *testing.T) {
	succeed(t, []reading{
		{"24 V", quantity.Volt, 24}, {"2 A", quantity.Ampere, 2}, {"2 S", quantity.Siemens, 2}, {"60 W", quantity.Watt, 60},
		{"63 VA", quantity.VoltAmpere, 63}, {"2 F", quantity.Farad, 2}, {"2 H", quantity.Henry, 2}, {"50 Hz", quantity.Hertz, 50},
		{"250 var", quantity.Var, 250}, {"2 F/km", quantity.FaradPerKilometre, 2}, {"0.5", quantity.None, 0.5},
		{"47 \u03a9", quantity.Ohm, 47}, {"47 \u2126", quantity.Ohm, 47}, {"47 ohm", quantity.Ohm, 47}, {"47 Ohm", quantity.Ohm, 47},
		{"47 ohms", quantity.Ohm, 47}, {"47 R", quantity.Ohm, 47}, {"10k ohm", quantity.Ohm, 10e3}, {"10 kohm", quantity.Ohm, 10e3},
		{"10 M\u2126", quantity.Ohm, 10e6}, {"5 %", quantity.Percent, 5}, {"5%", quantity.Percent, 5},
		{"20 °C", quantity.Celsius, 20}, {"-5C", quantity.Celsius, -5}, {"20 degC", quantity.Celsius, 20},
		{"45°", quantity.Degree, 45}, {"45 °", quantity.Degree, 45}, {"-30 deg", quantity.Degree, -30},
		{"1.5 mm²", quantity.SquareMillimetre, 1.5}, {"1.5mm2", quantity.SquareMillimetre, 1.5}, {"1.5 mm^2", quantity.SquareMillimetre, 1.5},
		{"1.5 sq mm", quantity.SquareMillimetre, 1.5}, {"0,75 mm²", quantity.SquareMillimetre, 0.75}, {"1.5", quantity.SquareMillimetre, 1.5},
	})
}

// The metre has the letter of milli, so that a length is never read as thousandths for want of a space.
func TestTheLetterMIsMetreInLengthsAndNeverMinutesInTimes(t *testing.T) {
	succeed(t, []reading{
		{"80 m", quantity.Metre, 80}, {"80m", quantity.Metre, 80}, {"80", quantity.Metre, 80}, {"80 mm", quantity.Metre, 0.08},
		{"80mm", quantity.Metre, 0.08}, {"1.2 km", quantity.Metre, 1200}, {"1k2", quantity.Metre, 1200},
		{"5 ms", quantity.Second, 0.005}, {"5ms", quantity.Second, 0.005}, {"2.5 s", quantity.Second, 2.5}, {"2.5", quantity.Second, 2.5},
	})
}

func TestNumbersAreReadInEveryForm(t *testing.T) {
	succeed(t, []reading{
		{"1e-3", quantity.Volt, 0.001}, {"1E3 V", quantity.Volt, 1000}, {"1e+3V", quantity.Volt, 1000}, {"1e\u22123 V", quantity.Volt, 0.001},
		{"1.5e3 kV", quantity.Volt, 1.5e6}, {"-24 V", quantity.Volt, -24}, {"\u221224 V", quantity.Volt, -24}, {"+24 V", quantity.Volt, 24},
		{".5 V", quantity.Volt, 0.5}, {"5. V", quantity.Volt, 5}, {"0,5", quantity.Volt, 0.5}, {"-0 V", quantity.Volt, 0}, {"0e9", quantity.Volt, 0},
		{"24\u00a0V", quantity.Volt, 24}, {"24\u2009V", quantity.Volt, 24}, {"24\u202fV", quantity.Volt, 24}, {"  24  V ", quantity.Volt, 24},
		{"0,750 mm²", quantity.SquareMillimetre, 0.75}, {"1,5000 V", quantity.Volt, 1.5}, {"1000,125 V", quantity.Volt, 1000.125},
		{strings.Repeat("0", 63) + "7", quantity.Volt, 7},
	})
}

// ASTM B258: the names of gauges (from memory) and the diameter d = 0.005 in × 92^((36−n)/39) with n = 1 − m for m/0.
func TestGaugesHaveTheDiametersOfASTMB258(t *testing.T) {
	for name, mils := range map[string]float64{
		"4/0 AWG": 460.0, "3/0": 409.6, "AWG 2/0": 364.8, "1/0 AWG": 324.9, "0": 324.9, "1 AWG": 289.3, "AWG10": 101.9,
		"14 AWG": 64.1, "18 AWG": 40.3, "18awg": 40.3, "AWG 36": 5.0, "0000 AWG": 460.0, "000": 409.6, "00": 364.8, "-1": 364.8, "\u22123 AWG": 460.0,
	} {
		number, err := quantity.Parse(name, quantity.Gauge)
		if err != nil {
			t.Errorf("%q: %v", name, err)
			continue
		}
		if got := 5 * math.Pow(92, (36-number)/39); math.Abs(got-mils) > 0.05 {
			t.Errorf("%q is read as gauge %v, %.1f mil thick, want %.1f", name, number, got, mils)
		}
	}
}

func TestTheExamplesInErrorsCanBeRead(t *testing.T) {
	for _, unit := range units {
		_, err := quantity.Parse("?", unit)
		if err == nil {
			t.Fatalf("%q: a question mark is read", unit)
		}
		_, examples, _ := strings.Cut(err.Error(), "write it as ")
		for _, example := range strings.Split(strings.Replace(examples, " or ", ", ", 1), ", ") {
			if _, err := quantity.Parse(example, unit); err != nil {
				t.Errorf("the example %q: %v", example, err)
			}
		}
	}
}

func TestAUnitOfAnotherTradeIsReadAndWrittenAsItsName(t *testing.T) {
	value, err := quantity.Parse("2.5 kg", quantity.Unit("kg"))
	if err != nil || value != 2.5 {
		t.Errorf("got %v, %v", value, err)
	}
	if got := quantity.Exact(2500, quantity.Unit("kg")); got != "2500 kg" {
		t.Errorf("got %q", got)
	}
}
