package quantity

import (
	"strconv"
	"strings"
	"unicode/utf8"
)

// number is a decimal number as it was read. It keeps the digits rather than a float64, so that a prefix shifts the
// decimal mark and rounds nothing.
type number struct {
	text      [longest + 16]byte // sign, digits and point; room for the exponent
	length    int                // of text in use
	figures   int                // how many digits were read
	power     int                // of ten, from a letter code or an exponent
	nonzero   bool
	coded     bool // a letter stands in place of the decimal mark
	ambiguous bool // its comma may part thousands
}

// scan reads a number at the start of the text and gives what follows it. Without a number, figures is 0.
func scan(text string, style *style) (n number, rest string) {
	rest = n.sign(text)
	first := rest
	rest = n.digits(rest)
	whole := n.figures
	mark, after := cutRune(rest)
	power, letter := style.letter(mark)
	switch {
	case letter && startsWithDigit(after):
		n.coded, n.power = true, power
		n.put('.')
		return n, n.digits(after)
	case mark == '.' || mark == ',':
		n.put('.')
		rest = n.digits(after)
		n.ambiguous = mark == ',' && whole >= 1 && whole <= 3 && first[0] != '0' && n.figures-whole == 3
	}
	if n.figures == 0 {
		return n, rest
	}
	n.power, rest = exponent(rest)
	return n, rest
}

func (n *number) put(char byte) {
	n.text[n.length] = char
	n.length++
}

// sign takes one sign off the text.
func (n *number) sign(text string) (rest string) {
	minus, rest := cutSign(text)
	if minus {
		n.put('-')
	}
	return rest
}

// digits takes the digits off the text.
func (n *number) digits(text string) (rest string) {
	for startsWithDigit(text) {
		n.nonzero = n.nonzero || text[0] != '0'
		n.put(text[0])
		n.figures++
		text = text[1:]
	}
	return text
}

// float gives the float64 nearest to the number times a power of ten, an infinity when it is too large.
func (n *number) float(power int) float64 {
	text := n.text[:n.length]
	if power += n.power; power != 0 {
		text = strconv.AppendInt(append(text, 'e'), int64(power), 10)
	}
	value, _ := strconv.ParseFloat(string(text), 64) // the digits are valid, so what can fail is the range
	return value
}

// exponent takes "e-3" off the text. The power is bounded, far beyond what a float64 holds.
func exponent(text string) (power int, rest string) {
	if text == "" || text[0] != 'e' && text[0] != 'E' {
		return 0, text
	}
	minus, rest := cutSign(text[1:])
	if !startsWithDigit(rest) {
		return 0, text
	}
	for ; startsWithDigit(rest); rest = rest[1:] {
		if power < 10_000 {
			power = 10*power + int(rest[0]-'0')
		}
	}
	if minus {
		power = -power
	}
	return power, rest
}

// cutSign takes one plus or minus sign off the text. The minus sign may be the hyphen of keyboards or that of print.
func cutSign(text string) (minus bool, rest string) {
	for _, sign := range [...]string{"-", "\u2212"} {
		if rest, ok := strings.CutPrefix(text, sign); ok {
			return true, rest
		}
	}
	return false, strings.TrimPrefix(text, "+")
}

func cutRune(text string) (rune, string) {
	first, size := utf8.DecodeRuneInString(text)
	return first, text[size:]
}

func startsWithDigit(text string) bool { return text != "" && text[0] >= '0' && text[0] <= '9' }

// isSpace knows the spaces that people and typesetters put between number and unit: ordinary, tab, no-break, thin and
// narrow no-break.
func isSpace(char rune) bool {
	return char == ' ' || char == '\t' || char == '\u00a0' || char == '\u2009' || char == '\u202f'
}

func skipSpace(text string) string { return strings.TrimLeftFunc(text, isSpace) }

func trimSpace(text string) string { return strings.TrimFunc(text, isSpace) }
