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
	for _, ref := range slices.Sorted(maps.Keys(c.Positions)) {
		if err := checkPosition(under(under(place, "positions"), ref), parts[ref], ref, c.Positions[ref]); err != nil {
			return err
		}
	}
	for _, ref := range slices.Sorted(maps.Keys(c.Timers)) {
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
