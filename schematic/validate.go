package schematic

import (
	"slices"
	"strings"
	"unicode"
	"unicode/utf8"

	"loopwright/schematic/kinds"
)

// Sizes lists the sizes of paper, after ISO 216 and ASME Y14.1.
func Sizes() []string { return []string{"A4", "A3", "A2", "A1", "A", "B", "C", "D"} }

// longest bounds every text that people write, in characters; longestRef bounds a reference designation.
const (
	longest    = 200
	longestRef = 20
)

// Validate checks all that must hold of a sheet beyond the form of its file. The error is a *PlaceError.
func Validate(sheet *Sheet) error {
	for _, check := range []func(*Sheet) error{checkHead, checkParts, checkWires, checkJoints, checkCases} {
		if err := check(sheet); err != nil {
			return err
		}
	}
	return nil
}

func checkHead(sheet *Sheet) error {
	for _, text := range []struct{ place, text string }{
		{"title", sheet.Title}, {"number", sheet.Number}, {"owner", sheet.Owner}, {"author", sheet.Author}, {"reference", sheet.Reference},
	} {
		if err := checkText(text.place, text.text); err != nil {
			return err
		}
	}
	switch {
	case sheet.System.Kind != "dc" && sheet.System.Kind != "ac":
		return refuse("system.kind", "%q is neither dc nor ac", sheet.System.Kind)
	case sheet.System.AC() && sheet.System.Hertz <= 0:
		return refuse("system.hz", "an ac sheet needs its frequency in hertz")
	case !sheet.System.AC() && sheet.System.Hertz != 0:
		return refuse("system.hz", "a dc sheet has no frequency; leave it out")
	case sheet.Symbols != kinds.IEC && sheet.Symbols != kinds.ANSI:
		return refuse("symbols", "%q is neither iec nor ansi", string(sheet.Symbols))
	case !slices.Contains(Sizes(), sheet.Size):
		return refuse("size", "%q is not one of %s", sheet.Size, strings.Join(Sizes(), ", "))
	}
	return nil
}

func checkText(place, text string) error {
	switch {
	case utf8.RuneCountInString(text) > longest:
		return refuse(place, "the text is longer than %d characters", longest)
	case strings.ContainsFunc(text, unicode.IsControl):
		return refuse(place, "the text holds a control character; leave it out")
	}
	return nil
}

func checkParts(sheet *Sheet) error {
	seen := make(map[string]int, len(sheet.Parts))
	for i := range sheet.Parts {
		part := &sheet.Parts[i]
		place := at("parts", i)
		if err := checkRef(under(place, "ref"), part.Ref); err != nil {
			return err
		}
		if first, taken := seen[part.Ref]; taken {
			return refuse(under(place, "ref"), "%q is the reference of parts[%d] already; number it otherwise", part.Ref, first)
		}
		seen[part.Ref] = i
		if err := checkPart(place, part, sheet.System); err != nil {
			return err
		}
	}
	return nil
}

// checkRef takes K1 and, for a contact of it, K1:2. The hyphen in front belongs to paper and not to the data.
func checkRef(place, ref string) error {
	device, number, contact := strings.Cut(ref, ":")
	switch {
	case ref == "":
		return refuse(place, "a part needs a reference such as K1")
	case utf8.RuneCountInString(ref) > longestRef:
		return refuse(place, "the reference is longer than %d characters", longestRef)
	case device == "" || strings.HasPrefix(ref, "-"):
		return refuse(place, "write the reference as K1, or K1:2 for a contact, without a hyphen in front")
	case contact && !isNumber(number):
		return refuse(place, "behind the colon stands the number of the contact, as in K1:2")
	}
	return checkName(place, device)
}

// checkName takes letters of any language, digits and a few signs.
func checkName(place, name string) error {
	for _, r := range name {
		if !unicode.IsLetter(r) && !unicode.IsDigit(r) && !strings.ContainsRune("._-+/", r) {
			return refuse(place, "a name here holds letters, digits and . _ - + / only, not %q", string(r))
		}
	}
	return nil
}

func isNumber(text string) bool {
	return text != "" && !strings.ContainsFunc(text, func(r rune) bool { return r < '0' || r > '9' })
}

func checkPart(place string, part *Part, system kinds.System) error {
	if !isTurn(part.Turn) {
		return refuse(under(place, "turn"), "%d is not one of 0, 90, 180, 270", part.Turn)
	}
	if err := checkReach(under(place, "at"), part.At); err != nil {
		return err
	}
	if part.Label != nil {
		if err := checkReach(under(place, "label"), *part.Label); err != nil {
			return err
		}
	}
	for _, spec := range part.Kind.Specs {
		if _, given := part.Values[spec.Name]; spec.Required && !given {
			return refuse(under(under(place, "values"), spec.Name), "a %s needs this value", part.Kind.Title)
		}
	}
	if system.AC() && part.Kind.DCOnly {
		return refuse(under(place, "kind"), "-%s is a %s, which has no place on an ac sheet: those are solved with phasors of one frequency", part.Ref, part.Kind.Title)
	}
	if part.Kind.Check == nil {
		return nil
	}
	if err := part.Kind.Check(part.Fill(), system); err != nil {
		name, says, found := strings.Cut(err.Error(), ": ")
		if !found {
			return refuse(under(place, "values"), "%s", err.Error())
		}
		return refuse(under(under(place, "values"), name), "%s", says)
	}
	return nil
}

// checkReach keeps sheets within reach, so that no sum of places can overflow.
func checkReach(place string, p Point) error {
	if p.X > furthest || p.X < -furthest || p.Y > furthest || p.Y < -furthest {
		return refuse(place, "the place is more than %d grid steps away", furthest)
	}
	return nil
}
