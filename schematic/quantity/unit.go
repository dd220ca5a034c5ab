// Package quantity reads and writes values as people put them down in the control-panel trade: "4k7", "24 V", "80 m",
// "0,75 mm²", "18 AWG", "5 %". It is pure and depends on nothing.
//
// A value is a float64 in the unit that its place on the sheet asks for, always without prefix: 4.7 kΩ is 4700 in Ohm,
// 1.5 mm² is 1.5 in SquareMillimetre, 5 % is 5 in Percent. Prefixes and spacing follow the SI Brochure, 9th edition
// (sections 3 and 5.4), letter codes IEC 60062, names of wire gauges ASTM B258.
package quantity

import "slices"

// Unit names the unit in which a quantity is stored in a sheet.
type Unit string

// The units of sheets. Gauge is a number of the American wire gauge, where 1/0 to 4/0 are 0 to −3.
const (
	None              Unit = ""
	Volt              Unit = "V"
	Ampere            Unit = "A"
	Ohm               Unit = "Ω"
	Siemens           Unit = "S"
	Watt              Unit = "W"
	VoltAmpere        Unit = "VA"
	Farad             Unit = "F"
	Henry             Unit = "H"
	Hertz             Unit = "Hz"
	Second            Unit = "s"
	Metre             Unit = "m"
	SquareMillimetre  Unit = "mm²"
	Gauge             Unit = "AWG"
	Celsius           Unit = "°C"
	Percent           Unit = "%"
	Degree            Unit = "°"
	FaradPerKilometre Unit = "F/km"
	Var               Unit = "var"
)

// style is how quantities of one unit are spoken of, read and written.
type style struct {
	unit      Unit
	name      string   // of the quantity: "voltage"
	examples  string   // of what can be written, for error messages
	spellings []string // of the unit, as they are read
	prefixed  bool     // takes SI prefixes and letter codes
	mark      rune     // letter of the unit that may stand in place of the decimal mark: R in 4R7; 0 for none
	bareMilli bool     // the letter m may stand for milli without the unit: 15m
}

// styles is never changed. The units that pages show most come first.
var styles = [...]style{
	{Volt, "voltage", "24 V, 500 mV or 24", []string{"V"}, true, 'V', true},
	{Ampere, "current", "2 A, 15 mA or 0.015", []string{"A"}, true, 'A', true},
	{Ohm, "resistance", "4.7 kΩ, 4k7 or 4700", []string{"Ω", "\u2126", "ohm", "Ohm", "ohms", "Ohms", "R"}, true, 'R', true},
	{Watt, "power", "60 W, 1.5 kW or 60", []string{"W"}, true, 0, true},
	{None, "number", "0.5, 20 or 1e-3", nil, true, 0, false},
	{Percent, "percentage", "5 %, 0.5 % or 5", []string{"%"}, false, 0, false},
	{Metre, "length", "80 m, 1.2 km or 80", []string{"m"}, true, 0, false},
	{SquareMillimetre, "cross-section", "1.5 mm², 0,75 mm² or 1.5", []string{"mm²", "mm2", "mm^2", "sq mm"}, false, 0, false},
	{Gauge, "wire gauge", "18 AWG, AWG 18 or 2/0", []string{"AWG", "awg"}, false, 0, false},
	{Celsius, "temperature", "20 °C, -5 °C or 20", []string{"°C", "C", "degC"}, false, 0, false},
	{Second, "time", "2.5 s, 300 ms or 2.5", []string{"s"}, true, 0, false},
	{VoltAmpere, "apparent power", "63 VA, 1.6 kVA or 63", []string{"VA"}, true, 0, true},
	{Farad, "capacitance", "100 nF, 4n7 or 1e-7", []string{"F"}, true, 'F', true},
	{Henry, "inductance", "1.2 H, 10 mH or 0.01", []string{"H"}, true, 0, true},
	{Hertz, "frequency", "50 Hz, 1 kHz or 50", []string{"Hz"}, true, 0, true},
	{Siemens, "conductance", "2 S, 5 mS or 0.005", []string{"S"}, true, 0, true},
	{Degree, "angle", "45°, -30° or 45", []string{"°", "deg"}, false, 0, false},
	{FaradPerKilometre, "capacitance per kilometre", "300 nF/km, 0.3 µF/km or 3e-7", []string{"F/km"}, true, 0, true},
	{Var, "reactive power", "250 var, 1.5 kvar or 250", []string{"var"}, true, 0, true},
}

// styleOf finds the style of a unit. A unit that the package does not know is read and written as its name, without
// prefixes.
func styleOf(unit Unit) *style {
	for i := range styles {
		if styles[i].unit == unit {
			return &styles[i]
		}
	}
	return &style{unit: unit, name: "value", examples: "1 " + string(unit) + " or 1", spellings: []string{string(unit)}}
}

// spells reports whether the text is a spelling of the unit.
func (s *style) spells(text string) bool { return slices.Contains(s.spellings, text) }

// scale is the power of ten that a prefix stands for. K is read as kilo, as IEC 60062 writes it; both code points of
// the micro sign, and u, are micro.
func scale(prefix rune) (power int, ok bool) {
	switch prefix {
	case 'p':
		return -12, true
	case 'n':
		return -9, true
	case 'u', '\u00b5', '\u03bc':
		return -6, true
	case 'm':
		return -3, true
	case 'k', 'K':
		return 3, true
	case 'M':
		return 6, true
	case 'G':
		return 9, true
	case 'T':
		return 12, true
	}
	return 0, false
}

// letter is the power of ten of a letter that stands in place of the decimal mark: k in 4k7, R in 4R7.
func (s *style) letter(mark rune) (power int, ok bool) {
	if !s.prefixed || mark == 'm' && !s.bareMilli {
		return 0, false
	}
	if mark == s.mark && mark != 0 {
		return 0, true
	}
	return scale(mark)
}

// suffix is the power of ten that what follows a number stands for, when it is the unit, a prefix, both, or nothing.
// Between a prefix and its unit a space is forgiven, as in "10k ohm", but not after m, which alone may be metre.
func (s *style) suffix(text string) (power int, ok bool) {
	if text == "" || s.spells(text) {
		return 0, true
	}
	prefix, tail := cutRune(text)
	power, ok = scale(prefix)
	switch {
	case !ok || !s.prefixed:
		return 0, false
	case prefix == 'm':
		return power, s.spells(tail) || tail == "" && s.bareMilli
	}
	tail = skipSpace(tail)
	return power, tail == "" || s.spells(tail)
}
