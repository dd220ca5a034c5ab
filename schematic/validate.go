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
	longestRef = 24
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

func checkRef(place, ref string) error {
	switch {
	case ref == "":
		return refuse(place, "a part needs a reference such as K1")
	case utf8.RuneCountInString(ref) > longestRef:
		return refuse(place, "the reference is longer than %d characters", longestRef)
	case strings.HasPrefix(ref, "-") || strings.HasPrefix(ref, ":") || strings.HasSuffix(ref, ":") || strings.Count(ref, ":") > 1:
		return refuse(place, "write the reference as K1, or K1:2 for a contact, without a hyphen in front")
	}
	for _, r := range ref {
		if !unicode.IsLetter(r) && !unicode.IsDigit(r) && !strings.ContainsRune(":._-+/", r) {
			return refuse(place, "a reference holds letters, digits and . _ - + / : only, not %q", string(r))
		}
	}
	return nil
}

func checkPart(place string, part *Part, system kinds.System) error {
	if part.Turn%90 != 0 || part.Turn < 0 || part.Turn > 270 {
		return refuse(under(place, "turn"), "%d is not one of 0, 90, 180, 270", part.Turn)
	}
	for _, p := range append([]Point{part.At}, labelPoint(part)...) {
		if err := checkReach(under(place, "at"), p); err != nil {
			return err
		}
	}
	for _, spec := range part.Kind.Specs {
		if _, given := part.Values[spec.Name]; spec.Required && !given {
			return refuse(under(under(place, "values"), spec.Name), "a %s needs this value", part.Kind.Title)
		}
	}
	if system.AC() && part.Kind.DCOnly {
		return refuse(under(place, "kind"), "a %s has no place on an ac sheet, which is solved with phasors of one frequency", part.Kind.Title)
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

func labelPoint(part *Part) []Point {
	if part.Label == nil {
		return nil
	}
	return []Point{*part.Label}
}

// checkReach keeps sheets within reach, so that no sum of places can overflow.
func checkReach(place string, p Point) error {
	if p.X > furthest || p.X < -furthest || p.Y > furthest || p.Y < -furthest {
		return refuse(place, "the place is more than %d grid steps away", furthest)
	}
	return nil
}

func checkWires(sheet *Sheet) error {
	names := make(map[string]bool, len(sheet.Wires))
	drawn := make(map[string]int, len(sheet.Wires))
	for i := range sheet.Wires {
		wire := &sheet.Wires[i]
		place := at("wires", i)
		if err := checkRef(under(place, "id"), wire.ID); err != nil {
			return refuse(under(place, "id"), "a wire's name holds letters and digits only")
		}
		if names[wire.ID] {
			return refuse(under(place, "id"), "%q is the name of another wire", wire.ID)
		}
		names[wire.ID] = true
		if err := checkChain(under(place, "points"), wire.Points); err != nil {
			return err
		}
		key := chainKey(wire.Points)
		if first, twice := drawn[key]; twice {
			return refuse(place, "wires[%d] is exactly the same; leave one out", first)
		}
		drawn[key] = i
	}
	return nil
}

func checkChain(place string, points []Point) error {
	if len(points) < 2 {
		return refuse(place, "a wire needs at least two places")
	}
	for i, p := range points {
		if err := checkReach(at(place, i), p); err != nil {
			return err
		}
		if i == 0 {
			continue
		}
		before := points[i-1]
		switch {
		case p == before:
			return refuse(at(place, i), "the segment has no length; leave the place out")
		case p.X != before.X && p.Y != before.Y:
			return refuse(at(place, i), "the segment is neither horizontal nor vertical; put a corner between")
		}
	}
	return nil
}

// chainKey is the same for a chain of places and its reverse, and for no other.
func chainKey(points []Point) string {
	forth, back := make([]byte, 0, 8*len(points)), make([]byte, 0, 8*len(points))
	for i := range points {
		forth = appendPoint(forth, points[i])
		back = appendPoint(back, points[len(points)-1-i])
	}
	return min(string(forth), string(back))
}

func checkJoints(sheet *Sheet) error {
	seen := map[Point]bool{}
	for i, joint := range sheet.Joints {
		place := at("joints", i)
		if seen[joint] {
			return refuse(place, "the joint is there twice; leave one out")
		}
		seen[joint] = true
		if err := checkReach(place, joint); err != nil {
			return err
		}
	}
	if len(seen) == 0 {
		return nil
	}
	level, upright := passes(sheet, seen)
	for i, joint := range sheet.Joints {
		if !level[joint] || !upright[joint] {
			return refuse(at("joints", i), "no wires cross here; a joint marks a crossing as joined")
		}
	}
	return nil
}

// passes tells at which of the given places a wire passes level and at which upright.
func passes(sheet *Sheet, places map[Point]bool) (level, upright map[Point]bool) {
	level, upright = map[Point]bool{}, map[Point]bool{}
	for _, wire := range sheet.Wires {
		for i := 1; i < len(wire.Points); i++ {
			for p := range places {
				if !onSegment(p, wire.Points[i-1], wire.Points[i]) {
					continue
				}
				if wire.Points[i-1].Y == wire.Points[i].Y {
					level[p] = true
				} else {
					upright[p] = true
				}
			}
		}
	}
	return level, upright
}

// onSegment reports whether a place lies on a horizontal or vertical segment, its ends included.
func onSegment(p, from, to Point) bool {
	return p.X >= min(from.X, to.X) && p.X <= max(from.X, to.X) && p.Y >= min(from.Y, to.Y) && p.Y <= max(from.Y, to.Y)
}

func checkCases(sheet *Sheet) error {
	if len(sheet.Cases) == 0 {
		return refuse("cases", "a sheet needs at least one case")
	}
	parts := make(map[string]*Part, len(sheet.Parts))
	for i := range sheet.Parts {
		parts[sheet.Parts[i].Ref] = &sheet.Parts[i]
	}
	earlier := map[string]bool{}
	for i := range sheet.Cases {
		c := &sheet.Cases[i]
		if err := checkCase(at("cases", i), c, earlier, parts); err != nil {
			return err
		}
		earlier[c.Name] = true
	}
	return nil
}

func checkCase(place string, c *Case, earlier map[string]bool, parts map[string]*Part) error {
	if err := checkText(under(place, "name"), c.Name); err != nil {
		return err
	}
	switch {
	case strings.TrimSpace(c.Name) == "":
		return refuse(under(place, "name"), "a case needs a name")
	case earlier[c.Name]:
		return refuse(under(place, "name"), "%q is the name of an earlier case; name it otherwise", c.Name)
	case c.Follows == c.Name:
		return refuse(under(place, "follows"), "a case cannot follow itself")
	case c.Follows != "" && !earlier[c.Follows]:
		return refuse(under(place, "follows"), "there is no earlier case %q; a case follows one that stands before it", c.Follows)
	case c.Supply != kinds.Low && c.Supply != kinds.Nominal && c.Supply != kinds.High:
		return refuse(under(place, "supply"), "%q is not one of low, nominal, high", string(c.Supply))
	}
	for _, ref := range sortedKeys(c.Positions) {
		if err := checkPosition(under(under(place, "positions"), ref), parts[ref], ref, c.Positions[ref]); err != nil {
			return err
		}
	}
	for _, ref := range sortedKeys(c.Timers) {
		return refuse(under(under(place, "timers"), ref), "%q is no coil with a delay", ref)
	}
	return nil
}

func checkPosition(place string, part *Part, ref, position string) error {
	switch {
	case part == nil:
		return refuse(place, "there is no part %q on the sheet", ref)
	case part.Kind.Positions == nil:
		return refuse(place, "a %s cannot be operated", part.Kind.Title)
	}
	if positions := part.Kind.Positions(part.Fill()); !slices.Contains(positions, position) {
		return refuse(place, "%q is not one of its positions %s", position, strings.Join(positions, ", "))
	}
	return nil
}

func sortedKeys(m map[string]string) []string {
	keys := make([]string, 0, len(m))
	for key := range m {
		keys = append(keys, key)
	}
	slices.Sort(keys)
	return keys
}
