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
		if err := checkText(text.text); err != nil {
			return below(err, text.place)
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

func checkText(text string) error {
	switch {
	case utf8.RuneCountInString(text) > longest:
		return refuse("", "the text is longer than %d characters", longest)
	case strings.ContainsFunc(text, unicode.IsControl):
		return refuse("", "the text holds a control character; leave it out")
	}
	return nil
}

func checkParts(sheet *Sheet) error {
	seen := make(map[string]int, len(sheet.Parts))
	for i := range sheet.Parts {
		part := &sheet.Parts[i]
		if first, taken := seen[part.Ref]; taken {
			return refuse(under(at("parts", i), "ref"), "%q is the reference of parts[%d] already; number it otherwise", part.Ref, first)
		}
		seen[part.Ref] = i
		if err := checkPart(part, sheet.System); err != nil {
			return below(err, at("parts", i))
		}
	}
	return nil
}

// checkRef takes K1 and, for a contact of it, K1:2. The hyphen in front belongs to paper and not to the data.
func checkRef(ref string) error {
	device, number, contact := strings.Cut(ref, ":")
	switch {
	case ref == "":
		return refuse("", "a part needs a reference such as K1")
	case utf8.RuneCountInString(ref) > longestRef:
		return refuse("", "the reference is longer than %d characters", longestRef)
	case device == "" || strings.HasPrefix(ref, "-"):
		return refuse("", "write the reference as K1, or K1:2 for a contact, without a hyphen in front")
	case contact && !isNumber(number):
		return refuse("", "behind the colon stands the number of the contact, as in K1:2")
	}
	return checkSigns(device)
}

// checkSigns takes letters of any language, digits and a few signs.
func checkSigns(name string) error {
	for _, r := range name {
		if !unicode.IsLetter(r) && !unicode.IsDigit(r) && !strings.ContainsRune("._-+/", r) {
			return refuse("", "a name here holds letters, digits and . _ - + / only, not %q", string(r))
		}
	}
	return nil
}

func isNumber(text string) bool {
	return text != "" && !strings.ContainsFunc(text, func(r rune) bool { return r < '0' || r > '9' })
}

func checkPart(part *Part, system kinds.System) error {
	if err := checkRef(part.Ref); err != nil {
		return below(err, "ref")
	}
	if !isTurn(part.Turn) {
		return refuse("turn", "%d is not one of 0, 90, 180, 270", part.Turn)
	}
	if err := checkReach(part.At); err != nil {
		return below(err, "at")
	}
	if part.Label != nil {
		if err := checkReach(*part.Label); err != nil {
			return below(err, "label")
		}
	}
	if system.AC() && part.Kind.DCOnly {
		return refuse("kind", "-%s is %s, which has no place on an ac sheet: those are solved with phasors of one frequency", part.Ref, oneOf(part))
	}
	if !system.AC() && part.Kind.ACOnly {
		return refuse("kind", "-%s is %s, which has no place on a dc sheet: nothing alternates there", part.Ref, oneOf(part))
	}
	return below(checkValues(part, system), "values")
}

func checkValues(part *Part, system kinds.System) error {
	for i := range part.Kind.Specs {
		spec := &part.Kind.Specs[i]
		if !spec.Required {
			continue
		}
		if _, given := part.Values[spec.Name]; !given {
			return refuse(spec.Name, "%s needs this value", oneOf(part))
		}
	}
	if part.Kind.Check == nil {
		return nil
	}
	err := part.Kind.Check(part.Fill(), system)
	if err == nil {
		return nil
	}
	if name, says, found := strings.Cut(err.Error(), ": "); found {
		return refuse(name, "%s", says)
	}
	return refuse("", "%s", err.Error())
}

// checkReach keeps sheets within reach, so that no sum of places can overflow.
func checkReach(p Point) error {
	if p.X > furthest || p.X < -furthest || p.Y > furthest || p.Y < -furthest {
		return refuse("", "the place is more than %d grid steps away", furthest)
	}
	return nil
}

// oneOf is the kind of a part with its article: "a lamp", "an ammeter".
func oneOf(part *Part) string {
	if strings.ContainsRune("aeiou", rune(part.Kind.Title[0])) {
		return "an " + part.Kind.Title
	}
	return "a " + part.Kind.Title
}
