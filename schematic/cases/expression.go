package cases

import (
	"math"
	"slices"
	"strconv"
	"strings"
)

// expression is a sum of terms as it is written down.
type expression []signedTerm

type signedTerm struct {
	negative bool
	text     string
}

func (e *expression) add(negative bool, text string) { *e = append(*e, signedTerm{negative, text}) }

// addAll adds or subtracts the terms of another sum.
func (e *expression) addAll(negative bool, terms expression) {
	for _, term := range terms {
		e.add(term.negative != negative, term.text)
	}
}

// positiveFirst is the sum with its positive terms first.
func (e expression) positiveFirst() expression {
	sorted := slices.Clone(e)
	slices.SortStableFunc(sorted, func(a, b signedTerm) int {
		switch {
		case a.negative == b.negative:
			return 0
		case b.negative:
			return -1
		}
		return 1
	})
	return sorted
}

// text writes the sum with the minus signs of print; an empty sum is 0.
func (e expression) text() string {
	if len(e) == 0 {
		return "0"
	}
	var out strings.Builder
	for i, term := range e {
		switch {
		case i == 0 && term.negative:
			out.WriteString("−")
		case i > 0 && term.negative:
			out.WriteString(" − ")
		case i > 0:
			out.WriteString(" + ")
		}
		out.WriteString(term.text)
	}
	return out.String()
}

// factor writes the sum so that it can be multiplied: in brackets unless it is one positive term.
func (e expression) factor() string {
	if len(e) == 1 && !e[0].negative {
		return e[0].text
	}
	return "(" + e.text() + ")"
}

// rounding is the share of a phasor below which one of its parts is nothing but the rounding of an angle.
const rounding = 1e-12

// number writes a real or complex figure with four significant digits.
func number(value complex128) string {
	re, im := math.Abs(real(value)), math.Abs(imag(value))
	if re < rounding*im {
		value = complex(0, imag(value))
	}
	if im < rounding*re {
		value = complex(real(value), 0)
	}
	if imag(value) == 0 {
		return figure(real(value))
	}
	if real(value) == 0 {
		return signed(imag(value)) + "j" + figure(math.Abs(imag(value)))
	}
	sign := " + j"
	if imag(value) < 0 {
		sign = " − j"
	}
	return "(" + figure(real(value)) + sign + figure(math.Abs(imag(value))) + ")"
}

func signed(value float64) string {
	if value < 0 {
		return "−"
	}
	return ""
}

// figure writes a number with four significant digits, in full where that is no longer than a power of ten would be.
func figure(value float64) string {
	if value == 0 {
		return "0"
	}
	text := strconv.FormatFloat(math.Abs(value), 'e', 3, 64)
	rounded, _ := strconv.ParseFloat(text, 64) // FormatFloat writes what ParseFloat reads
	if rounded >= 1e-4 && rounded < 1e7 {
		return signed(value) + strconv.FormatFloat(rounded, 'f', -1, 64)
	}
	mantissa, exponent, _ := strings.Cut(text, "e")
	power, _ := strconv.Atoi(exponent) // and what Atoi reads
	mantissa = strings.TrimRight(strings.TrimRight(mantissa, "0"), ".") + "·"
	if mantissa == "1·" {
		mantissa = ""
	}
	return signed(value) + mantissa + "10" + superscript(power)
}

func superscript(power int) string {
	return strings.Map(func(r rune) rune {
		if r == '-' {
			return '⁻'
		}
		return []rune("⁰¹²³⁴⁵⁶⁷⁸⁹")[r-'0']
	}, strconv.Itoa(power))
}
