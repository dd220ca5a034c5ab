package quantity

import (
	"math"
	"strings"
	"unicode/utf8"
)

// longest bounds what is read as a quantity, in characters.
const longest = 64

// Parse reads what a person wrote as a quantity of the given unit and gives the number in that unit: 4700 for "4k7" in
// Ohm, 5 for "5 %" in Percent, 80 for "80m" in Metre. The unit may be left out.
//
// It reads SI prefixes from p to T, letter codes of IEC 60062, decimal point or comma, exponents, spaces that do not
// break, and the names of gauges of ASTM B258. The decimal written is rounded once, to the nearest float64; −0 becomes 0.
//
// The error is one sentence for the person who wrote it: what was read, what is wrong with it, what can be written.
// What could be understood in two ways is refused: "1,000 V" and, as a time, "5 m".
func Parse(text string, unit Unit) (float64, error) {
	style := styleOf(unit)
	body := trimSpace(text)
	switch {
	case len(text) > longest && utf8.RuneCountInString(text) > longest:
		return 0, style.tooLong(text)
	case body == "":
		return 0, style.empty(text)
	case unit == Gauge:
		return parseGauge(text, body, style)
	}
	number, rest := scan(body, style)
	rest = skipSpace(rest)
	power, ok := style.suffix(rest)
	switch {
	case number.figures == 0 && strings.ContainsAny(body, "0123456789"):
		return 0, style.unreadable(text, body)
	case number.figures == 0:
		return 0, style.unreadable(text, "")
	case number.coded && rest != "" && !style.spells(rest):
		return 0, style.unreadable(text, rest)
	case !ok:
		return 0, style.unreadable(text, rest)
	}
	return number.value(text, power, style)
}

// value rounds the number, shifted by a power of ten, to the nearest float64.
func (n *number) value(text string, power int, style *style) (float64, error) {
	if n.ambiguous {
		return 0, style.twoReadings(text)
	}
	value := n.float(power)
	switch {
	case math.IsInf(value, 0):
		return 0, style.outOfRange(text, "large")
	case value == 0 && n.nonzero:
		return 0, style.outOfRange(text, "small")
	case value == 0:
		return 0, nil
	}
	return value, nil
}

// parseGauge reads a wire gauge, whose unit may stand before the number and whose thick sizes have names of their own.
func parseGauge(text, body string, style *style) (float64, error) {
	bare := cutGauge(body, style)
	if number, ok := aught(bare); ok {
		return number, nil
	}
	number, rest := scan(bare, style)
	if number.figures == 0 || rest != "" {
		return 0, style.unreadable(text, skipSpace(rest))
	}
	return number.value(text, 0, style)
}

// cutGauge takes the unit off, before or after the number.
func cutGauge(body string, style *style) string {
	for _, spelling := range style.spellings {
		if bare, ok := strings.CutPrefix(body, spelling); ok {
			return skipSpace(bare)
		}
		if bare, ok := strings.CutSuffix(body, spelling); ok {
			return trimSpace(bare)
		}
	}
	return body
}

// aught is the number of a gauge that is named by its count of zeros: 2/0, also written 00, is −1.
func aught(name string) (number float64, ok bool) {
	switch name {
	case "0", "1/0":
		return 0, true
	case "00", "2/0":
		return -1, true
	case "000", "3/0":
		return -2, true
	case "0000", "4/0":
		return -3, true
	}
	return 0, false
}
