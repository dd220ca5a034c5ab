package quantity

import (
	"fmt"
	"strconv"
	"strings"
)

// quoted shows what was read.
func quoted(text string) string { return strconv.Quote(text) }

// beginning shows the first characters of what is too long to be shown.
func beginning(text string) string {
	left := 24
	for at := range text {
		if left == 0 {
			return quoted(text[:at] + "…")
		}
		left--
	}
	return quoted(text)
}

// article puts "a" or "an" before the name of a quantity.
func article(name string) string {
	if strings.ContainsRune("aeiou", rune(name[0])) {
		return "an " + name
	}
	return "a " + name
}

// wanted names the quantity and its unit.
func (s *style) wanted() string {
	if s.unit == None {
		return "a number without unit"
	}
	return article(s.name) + " in " + string(s.unit)
}

func (s *style) tooLong(text string) error {
	return fmt.Errorf("%s is longer than %d characters: write %s as %s", beginning(text), longest, article(s.name), s.examples)
}

func (s *style) empty(text string) error {
	return fmt.Errorf("%s is empty: write %s as %s", quoted(text), article(s.name), s.examples)
}

func (s *style) outOfRange(text, size string) error {
	return fmt.Errorf("%s is too %s %s to compute with: write it as %s", quoted(text), size, article(s.name), s.examples)
}

// twoReadings refuses a comma that is the decimal mark for some and parts the thousands for others: three orders of
// magnitude are too much to guess.
func (s *style) twoReadings(text string) error {
	body := trimSpace(text)
	point, plain := strings.Replace(body, ",", ".", 1), strings.Replace(body, ",", "", 1)
	return fmt.Errorf("%s has a comma that can be read in two ways: write %s or %s", quoted(text), point, plain)
}

// unreadable says why what follows the number, or the whole text when there is none, is not understood.
func (s *style) unreadable(text, rest string) error {
	switch {
	case s.unit == Second && strings.HasPrefix(rest, "min"):
		return fmt.Errorf("%s is given in minutes: write the time in seconds, as %s", quoted(text), s.examples)
	case s.unit == Second && rest == "m":
		return fmt.Errorf("%s may mean minutes or milliseconds: write the time as %s", quoted(text), s.examples)
	}
	if other := s.other(rest); other != nil {
		return fmt.Errorf("%s is %s where %s is wanted: write it as %s", quoted(text), article(other.name), s.wanted(), s.examples)
	}
	if prefix, ok := s.refusedPrefix(rest); ok {
		return fmt.Errorf("%s has the prefix %s, which %s does not take: write it as %s", quoted(text), prefix, s.unit, s.examples)
	}
	return fmt.Errorf("%s is no %s: write it as %s", quoted(text), s.name, s.examples)
}

// other finds the style of the quantity that somebody gave in place of the wanted one; nil when its unit says nothing.
func (s *style) other(rest string) *style {
	for i := range styles {
		other := &styles[i]
		_, tail := cutRune(rest)
		prefixed := other.prefixed && other.spells(tail)
		_, fits := other.suffix(rest)
		if other != s && (other.spells(rest) || fits && prefixed || other.unit == Gauge && cutGauge(rest, other) != rest) {
			return other
		}
	}
	return nil
}

// refusedPrefix finds a prefix, or a letter in place of the decimal mark, before a unit that takes none.
func (s *style) refusedPrefix(rest string) (prefix string, ok bool) {
	first, tail := cutRune(rest)
	_, ok = scale(first)
	return string(first), ok && !s.prefixed && (tail == "" || s.spells(skipSpace(tail)) || startsWithDigit(tail))
}
