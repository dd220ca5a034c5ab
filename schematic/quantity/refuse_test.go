package quantity_test

import (
	"strings"
	"testing"

	"loopwright/schematic/quantity"
)

type refusal struct {
	text string
	unit quantity.Unit
	says string
}

func refuse(t *testing.T, table []refusal) {
	t.Helper()
	for _, test := range table {
		value, err := quantity.Parse(test.text, test.unit)
		if err == nil {
			t.Errorf("Parse(%q, %q) = %v, want an error", test.text, test.unit, value)
		} else if err.Error() != test.says {
			t.Errorf("Parse(%q, %q) says\n\t%s\nwant\n\t%s", test.text, test.unit, err, test.says)
		} else if value != 0 {
			t.Errorf("Parse(%q, %q) gives %v beside its error", test.text, test.unit, value)
		}
	}
}

func TestWhatIsNoQuantityIsRefusedWithAnExample(t *testing.T) {
	refuse(t, []refusal{
		{"12 apples", quantity.Ohm, `"12 apples" is no resistance: write it as 4.7 kΩ, 4k7 or 4700`},
		{"abc", quantity.Volt, `"abc" is no voltage: write it as 24 V, 500 mV or 24`},
		{"V", quantity.Volt, `"V" is no voltage: write it as 24 V, 500 mV or 24`},
		{"m", quantity.Second, `"m" is no time: write it as 2.5 s, 300 ms or 2.5`},
		{"-", quantity.Volt, `"-" is no voltage: write it as 24 V, 500 mV or 24`},
		{".", quantity.Volt, `"." is no voltage: write it as 24 V, 500 mV or 24`},
		{"R", quantity.Ohm, `"R" is no resistance: write it as 4.7 kΩ, 4k7 or 4700`},
		{"--5", quantity.Celsius, `"--5" is no temperature: write it as 20 °C, -5 °C or 20`},
		{"1.2.3", quantity.None, `"1.2.3" is no number: write it as 0.5, 20 or 1e-3`},
		{"1.234,5 V", quantity.Volt, `"1.234,5 V" is no voltage: write it as 24 V, 500 mV or 24`},
		{"5e V", quantity.Volt, `"5e V" is no voltage: write it as 24 V, 500 mV or 24`},
		{"0x10", quantity.Volt, `"0x10" is no voltage: write it as 24 V, 500 mV or 24`},
		{"1_000", quantity.Volt, `"1_000" is no voltage: write it as 24 V, 500 mV or 24`},
		{"5 kkV", quantity.Volt, `"5 kkV" is no voltage: write it as 24 V, 500 mV or 24`},
		{"4k7k", quantity.Ohm, `"4k7k" is no resistance: write it as 4.7 kΩ, 4k7 or 4700`},
		{"4k7e3", quantity.Ohm, `"4k7e3" is no resistance: write it as 4.7 kΩ, 4k7 or 4700`},
		{"4k7 kΩ", quantity.Ohm, `"4k7 kΩ" is no resistance: write it as 4.7 kΩ, 4k7 or 4700`},
		{"4.7k7", quantity.Ohm, `"4.7k7" is no resistance: write it as 4.7 kΩ, 4k7 or 4700`},
		{"80 m m", quantity.Metre, `"80 m m" is no length: write it as 80 m, 1.2 km or 80`},
		{"4m7", quantity.Metre, `"4m7" is no length: write it as 80 m, 1.2 km or 80`},
		{"5/0", quantity.Gauge, `"5/0" is no wire gauge: write it as 18 AWG, AWG 18 or 2/0`},
		{"AWG", quantity.Gauge, `"AWG" is no wire gauge: write it as 18 AWG, AWG 18 or 2/0`},
		{"AWG 18 AWG", quantity.Gauge, `"AWG 18 AWG" is no wire gauge: write it as 18 AWG, AWG 18 or 2/0`},
		{"5 \xff", quantity.Volt, `"5 \xff" is no voltage: write it as 24 V, 500 mV or 24`},
	})
}

func TestWhatIsNotFiniteIsRefused(t *testing.T) {
	refuse(t, []refusal{
		{"Inf", quantity.Henry, `"Inf" is no inductance: write it as 1.2 H, 10 mH or 0.01`},
		{"-infinity", quantity.Hertz, `"-infinity" is no frequency: write it as 50 Hz, 1 kHz or 50`},
		{"NaN", quantity.Farad, `"NaN" is no capacitance: write it as 100 nF, 4n7 or 1e-7`},
		{"1e309 V", quantity.Volt, `"1e309 V" is too large a voltage to compute with: write it as 24 V, 500 mV or 24`},
		{"1e300 TΩ", quantity.Ohm, `"1e300 TΩ" is too large a resistance to compute with: write it as 4.7 kΩ, 4k7 or 4700`},
		{"-1e99999999999999999999", quantity.Ampere, `"-1e99999999999999999999" is too large a current to compute with: write it as 2 A, 15 mA or 0.015`},
		{"1e-400", quantity.Ampere, `"1e-400" is too small a current to compute with: write it as 2 A, 15 mA or 0.015`},
	})
}

func TestNothingAndTooMuchAreRefused(t *testing.T) {
	refuse(t, []refusal{
		{"", quantity.Henry, `"" is empty: write an inductance as 1.2 H, 10 mH or 0.01`},
		{" \t", quantity.Var, `" \t" is empty: write a reactive power as 250 var, 1.5 kvar or 250`},
		{strings.Repeat("1", 65), quantity.VoltAmpere, `"` + strings.Repeat("1", 24) + `…" is longer than 64 characters: write an apparent power as 63 VA, 1.6 kVA or 63`},
		{strings.Repeat("Ω", 65), quantity.Ohm, `"` + strings.Repeat("Ω", 24) + `…" is longer than 64 characters: write a resistance as 4.7 kΩ, 4k7 or 4700`},
		{strings.Repeat("Ω", 64), quantity.Ohm, `"` + strings.Repeat("Ω", 64) + `" is no resistance: write it as 4.7 kΩ, 4k7 or 4700`},
	})
}

func TestAnotherQuantityIsNamedBesideTheOneWanted(t *testing.T) {
	refuse(t, []refusal{
		{"5 A", quantity.Volt, `"5 A" is a current where a voltage in V is wanted: write it as 24 V, 500 mV or 24`},
		{"15mA", quantity.Volt, `"15mA" is a current where a voltage in V is wanted: write it as 24 V, 500 mV or 24`},
		{"24 V", quantity.Ampere, `"24 V" is a voltage where a current in A is wanted: write it as 2 A, 15 mA or 0.015`},
		{"10 kohm", quantity.Siemens, `"10 kohm" is a resistance where a conductance in S is wanted: write it as 2 S, 5 mS or 0.005`},
		{"5 V", quantity.None, `"5 V" is a voltage where a number without unit is wanted: write it as 0.5, 20 or 1e-3`},
		{"5 m", quantity.None, `"5 m" is a length where a number without unit is wanted: write it as 0.5, 20 or 1e-3`},
		{"50 W", quantity.VoltAmpere, `"50 W" is a power where an apparent power in VA is wanted: write it as 63 VA, 1.6 kVA or 63`},
		{"1.5 mm", quantity.SquareMillimetre, `"1.5 mm" is a length where a cross-section in mm² is wanted: write it as 1.5 mm², 0,75 mm² or 1.5`},
		{"1.5 mm2", quantity.Metre, `"1.5 mm2" is a cross-section where a length in m is wanted: write it as 80 m, 1.2 km or 80`},
		{"18 AWG", quantity.SquareMillimetre, `"18 AWG" is a wire gauge where a cross-section in mm² is wanted: write it as 1.5 mm², 0,75 mm² or 1.5`},
		{"AWG 18", quantity.SquareMillimetre, `"AWG 18" is a wire gauge where a cross-section in mm² is wanted: write it as 1.5 mm², 0,75 mm² or 1.5`},
		{"0.75 mm²", quantity.Gauge, `"0.75 mm²" is a cross-section where a wire gauge in AWG is wanted: write it as 18 AWG, AWG 18 or 2/0`},
		{"45 °C", quantity.Degree, `"45 °C" is a temperature where an angle in ° is wanted: write it as 45°, -30° or 45`},
		{"5 nF", quantity.FaradPerKilometre, `"5 nF" is a capacitance where a capacitance per kilometre in F/km is wanted: write it as 300 nF/km, 0.3 µF/km or 3e-7`},
		{"5 %", quantity.Second, `"5 %" is a percentage where a time in s is wanted: write it as 2.5 s, 300 ms or 2.5`},
	})
}

// That these units take no prefix is common practice, no source.
func TestAPrefixIsRefusedWhereTheUnitTakesNone(t *testing.T) {
	refuse(t, []refusal{
		{"5 k%", quantity.Percent, `"5 k%" has the prefix k, which % does not take: write it as 5 %, 0.5 % or 5`},
		{"2 m°C", quantity.Celsius, `"2 m°C" has the prefix m, which °C does not take: write it as 20 °C, -5 °C or 20`},
		{"5 K", quantity.Celsius, `"5 K" has the prefix K, which °C does not take: write it as 20 °C, -5 °C or 20`},
		{"1 kmm²", quantity.SquareMillimetre, `"1 kmm²" has the prefix k, which mm² does not take: write it as 1.5 mm², 0,75 mm² or 1.5`},
		{"1k5", quantity.SquareMillimetre, `"1k5" has the prefix k, which mm² does not take: write it as 1.5 mm², 0,75 mm² or 1.5`},
		{"18 kAWG", quantity.Gauge, `"18 kAWG" has the prefix k, which AWG does not take: write it as 18 AWG, AWG 18 or 2/0`},
		{"4µ7", quantity.Degree, `"4µ7" has the prefix µ, which ° does not take: write it as 45°, -30° or 45`},
	})
}

func TestWhatCanBeReadInTwoWaysIsRefused(t *testing.T) {
	refuse(t, []refusal{
		{"5 m", quantity.Second, `"5 m" may mean minutes or milliseconds: write the time as 2.5 s, 300 ms or 2.5`},
		{"5m", quantity.Second, `"5m" may mean minutes or milliseconds: write the time as 2.5 s, 300 ms or 2.5`},
		{"5 min", quantity.Second, `"5 min" is given in minutes: write the time in seconds, as 2.5 s, 300 ms or 2.5`},
		{"1,000 V", quantity.Volt, `"1,000 V" has a comma that can be read in two ways: write 1.000 V or 1000 V`},
		{"-12,345", quantity.None, `"-12,345" has a comma that can be read in two ways: write -12.345 or -12345`},
	})
}
