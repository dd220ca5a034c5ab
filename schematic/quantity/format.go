package quantity

import (
	"math"
	"strconv"
)

// absent is written for a value that is not a finite number.
const absent = "—"

// Format writes a value for reading, in engineering notation with a number of significant digits from 1 to 17:
// Format(0.2441, Ampere, 4) is "244.1 mA", Format(-24, Volt, 4) is "−24.00 V" with the minus sign of print.
//
// Trailing zeros are kept to show the digits, but zero itself is "0 V". Quantities that take no prefix (numbers, %, °C,
// °, mm², AWG) are written without trailing zeros: "5 %". What is not finite is "—".
func Format(value float64, unit Unit, digits int) string {
	var buffer [48]byte
	return string(Append(buffer[:0], value, unit, digits))
}

// Append appends to dst what Format writes and allocates nothing when dst has room for it.
func Append(dst []byte, value float64, unit Unit, digits int) []byte {
	digits = min(max(digits, 1), 17)
	return appendValue(dst, value, styleOf(unit), digits, "\u2212")
}

// Exact writes a value for storing and editing, with as few digits as Parse needs to read exactly the same float64:
// "4.7 kΩ", "24 V", "0.75 mm²", "5 %", "18 AWG", "2/0 AWG". The minus sign is that of keyboards. What is not finite
// is "—", which Parse refuses.
func Exact(value float64, unit Unit) string {
	var buffer [48]byte
	return string(appendValue(buffer[:0], value, styleOf(unit), shortest, "-"))
}

// shortest asks for as few digits as read back to the same value.
const shortest = 0

func appendValue(dst []byte, value float64, s *style, digits int, minus string) []byte {
	if math.IsNaN(value) || math.IsInf(value, 0) {
		return append(dst, absent...)
	}
	if s.unit == Gauge && value <= 0 && value >= -3 && value == math.Trunc(value) {
		dst = strconv.AppendInt(dst, 1-int64(value), 10)
		return append(dst, "/0 AWG"...)
	}
	if value < 0 {
		dst, value = append(dst, minus...), -value
	}
	var buffer [32]byte
	figures, power := decimal(buffer[:0], value, digits)
	if !s.scaled() || digits == shortest || value == 0 {
		figures = trimZeros(figures)
	}
	group := s.group(power)
	dst = appendDigits(dst, figures, power-group)
	return s.appendUnit(dst, group, minus)
}

// decimal gives the significant digits of a value that is not negative, and the power of ten of the first of them. The
// rounding is that of the decimal value, exactly, so that 999.96 with four digits already starts with a thousand.
func decimal(buffer []byte, value float64, digits int) (figures []byte, power int) {
	text := strconv.AppendFloat(buffer, math.Abs(value), 'e', digits-1, 64) // "2.441e-01"
	end := len(text) - 1
	for tens := 1; text[end] >= '0' && text[end] <= '9'; end-- {
		power += tens * int(text[end]-'0')
		tens *= 10
	}
	if text[end] == '-' {
		power = -power
	}
	figures = text[:end-1]
	if len(figures) > 1 {
		figures = figures[:1+copy(figures[1:], figures[2:])]
	}
	return figures, power
}

func trimZeros(figures []byte) []byte {
	for len(figures) > 1 && figures[len(figures)-1] == '0' {
		figures = figures[:len(figures)-1]
	}
	return figures
}

// scaled reports whether values are written with prefixes. Plain numbers are not, although 10k is read: the SI Brochure
// attaches no prefix to the unit one.
func (s *style) scaled() bool { return s.prefixed && s.unit != None }

// group is the power of ten that is written as a prefix or an exponent: a multiple of three. What takes no prefix is
// written out between 0.0001 and 10¹⁵.
func (s *style) group(power int) int {
	if !s.scaled() && power >= -4 && power < 15 {
		return 0
	}
	group := power - power%3
	if group > power {
		group -= 3
	}
	return group
}

// appendDigits writes the digits with the decimal point; the first has the given power of ten.
func appendDigits(dst, figures []byte, power int) []byte {
	if power < 0 {
		dst = append(dst, "0."...)
		for ; power < -1; power++ {
			dst = append(dst, '0')
		}
		return append(dst, figures...)
	}
	for len(figures) <= power {
		figures = append(figures, '0')
	}
	dst = append(dst, figures[:power+1]...)
	if len(figures) > power+1 {
		dst = append(append(dst, '.'), figures[power+1:]...)
	}
	return dst
}

// appendUnit writes the power of ten, as a prefix where there is one, and the unit. A space parts unit and number, save
// for the degree of angle (SI Brochure, 9th edition, section 5.4.3).
func (s *style) appendUnit(dst []byte, group int, minus string) []byte {
	prefixed := s.scaled() && group >= -12 && group <= 12
	if group != 0 && !prefixed {
		dst = append(dst, 'e')
		if group < 0 {
			dst = append(dst, minus...)
			group = -group
		}
		dst = strconv.AppendInt(dst, int64(group), 10)
	}
	if s.unit != None && s.unit != Degree {
		dst = append(dst, ' ')
	}
	if prefixed {
		dst = append(dst, [...]string{"p", "n", "µ", "m", "", "k", "M", "G", "T"}[group/3+4]...)
	}
	return append(dst, s.unit...)
}
