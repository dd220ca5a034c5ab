package schematic

import (
	"maps"
	"slices"
	"strings"

	"loopwright/schematic/kinds"
)

func checkCases(sheet *Sheet) error {
	if len(sheet.Cases) == 0 {
		return refuse("cases", "a sheet needs at least one case")
	}
	parts := sheet.byRef()
	earlier := map[string]bool{}
	for i := range sheet.Cases {
		c := &sheet.Cases[i]
		if err := checkCase(c, earlier, parts); err != nil {
			return below(err, at("cases", i))
		}
		earlier[c.Name] = true
	}
	return nil
}

func checkCase(c *Case, earlier map[string]bool, parts map[string]*Part) error {
	if err := checkText(c.Name); err != nil {
		return below(err, "name")
	}
	switch {
	case strings.TrimSpace(c.Name) == "":
		return refuse("name", "a case needs a name")
	case earlier[c.Name]:
		return refuse("name", "%q is the name of an earlier case; name it otherwise", c.Name)
	case c.Follows == c.Name:
		return refuse("follows", "a case cannot follow itself")
	case c.Follows != "" && !earlier[c.Follows]:
		return refuse("follows", "there is no earlier case %q; a case follows one that stands before it", c.Follows)
	case c.Supply != kinds.Low && c.Supply != kinds.Nominal && c.Supply != kinds.High:
		return refuse("supply", "%q is not one of low, nominal, high", string(c.Supply))
	}
	for _, ref := range slices.Sorted(maps.Keys(c.Positions)) {
		if err := checkPosition(parts[ref], ref, c.Positions[ref]); err != nil {
			return below(err, under("positions", ref))
		}
	}
	for _, ref := range slices.Sorted(maps.Keys(c.Timers)) {
		return refuse(under("timers", ref), "%q is no coil with a delay", ref)
	}
	return nil
}

func checkPosition(part *Part, ref, position string) error {
	switch {
	case part == nil:
		return refuse("", "there is no part %q on the sheet", ref)
	case part.Kind.Positions == nil:
		return refuse("", "-%s is %s, which cannot be operated", ref, oneOf(part))
	}
	if positions := part.Kind.Positions(part.Fill()); !slices.Contains(positions, position) {
		return refuse("", "%q is not one of its positions %s", position, strings.Join(positions, ", "))
	}
	return nil
}
