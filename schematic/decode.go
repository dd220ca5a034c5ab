package schematic

import (
	"strconv"

	"loopwright/schematic/kinds"
)

// Decode reads a sheet file. What it cannot understand it refuses with a *PlaceError that says where; text that is no
// JSON at all gives a *SyntaxError, which is a PlaceError too. A sheet that it returns passes Validate, names all its
// wires, and holds no value and no position that says no more than the default. Its cost is linear in the file.
func Decode(data []byte) (*Sheet, error) {
	tree, err := parse(data)
	if err != nil {
		return nil, err
	}
	sheet := &Sheet{Symbols: kinds.IEC, Size: "A4"}
	if err := readSheet(tree, sheet); err != nil {
		return nil, err
	}
	nameWires(sheet)
	if len(sheet.Cases) == 0 {
		sheet.Cases = []Case{{Name: restCase, Supply: kinds.Nominal}}
	}
	if err := Validate(sheet); err != nil {
		return nil, err
	}
	for i := range sheet.Parts {
		sheet.Parts[i].dropDefaults()
	}
	parts := sheet.byRef()
	for i := range sheet.Cases {
		sheet.Cases[i] = sheet.Cases[i].withoutRest(parts)
	}
	return sheet, nil
}

// dropDefaults leaves out the values that say no more than the default.
func (p *Part) dropDefaults() {
	for _, spec := range p.Kind.Specs {
		if value, given := p.Values[spec.Name]; given && !spec.Required && !spec.Optional && value.Same(spec.Default) {
			delete(p.Values, spec.Name)
		}
	}
}

// restCase is the name of the case that every sheet without cases has.
const restCase = "Rest"

// New is an empty DC sheet of size A4.
func New(title string) *Sheet {
	return &Sheet{Title: title, System: kinds.System{Kind: "dc"}, Symbols: kinds.IEC, Size: "A4",
		Cases: []Case{{Name: restCase, Supply: kinds.Nominal}}}
}

func readSheet(tree any, sheet *Sheet) error {
	for _, needed := range []string{"format", "system"} {
		if _, ok := tree.(object); ok && !has(tree, needed) {
			return refuse(needed, "the sheet needs this field")
		}
	}
	fields := headReaders(sheet)
	fields["format"] = func(value any, place string) error {
		if value != Format {
			return refuse(place, "this is not %q; only that format can be read", Format)
		}
		return nil
	}
	fields["parts"] = func(value any, place string) error {
		return list(value, place, func(item any, place string) error {
			part, err := readPart(item, place, true)
			sheet.Parts = append(sheet.Parts, part)
			return err
		})
	}
	fields["wires"] = func(value any, place string) error {
		return list(value, place, func(item any, place string) error {
			wire, err := readWire(item, place)
			sheet.Wires = append(sheet.Wires, wire)
			return err
		})
	}
	fields["joints"] = intoPoints(&sheet.Joints)
	fields["cases"] = func(value any, place string) error {
		return list(value, place, func(item any, place string) error {
			c, err := readCase(item, place)
			sheet.Cases = append(sheet.Cases, c)
			return err
		})
	}
	return readFields(tree, "", "a sheet", fields)
}

// headReaders read what stands in the title block and what the sheet is set to.
func headReaders(sheet *Sheet) readers {
	return readers{
		"title": intoText(&sheet.Title), "number": intoText(&sheet.Number),
		"owner": intoText(&sheet.Owner), "author": intoText(&sheet.Author),
		"size": intoText(&sheet.Size), "reference": intoText(&sheet.Reference),
		"symbols": func(value any, place string) error {
			var name string
			err := intoText(&name)(value, place)
			sheet.Symbols = kinds.SymbolSet(name)
			return err
		},
		"system": func(value any, place string) (err error) {
			sheet.System, err = readSystem(value, place)
			return err
		},
	}
}

func readSystem(value any, place string) (kinds.System, error) {
	var system kinds.System
	err := readFields(value, place, "a system", readers{
		"kind": intoText(&system.Kind),
		"hz": func(value any, place string) error {
			hertz, ok := value.(float64)
			if !ok || hertz <= 0 {
				return refuse(place, "write a frequency in hertz, more than 0")
			}
			system.Hertz = hertz
			return nil
		},
	})
	return system, err
}

// readPart reads a part; needsRef says whether it must have a reference already.
func readPart(value any, place string, needsRef bool) (Part, error) {
	var part Part
	kindName := ""
	// The kind comes first, since the values cannot be read without it.
	if members, ok := value.(object); ok {
		for _, needed := range []string{"kind", "at", "ref"} {
			if !has(members, needed) && (needsRef || needed != "ref") {
				return part, refuse(under(place, needed), "a part needs this field")
			}
		}
		for _, m := range members {
			if m.key == "kind" {
				kindName, _ = m.value.(string)
			}
		}
		kind, err := kinds.Lookup(kindName)
		if err != nil {
			return part, refuse(under(place, "kind"), "%v", err)
		}
		part.Kind = kind
	}
	err := readFields(value, place, "a part", readers{
		"ref": intoText(&part.Ref), "kind": intoText(&kindName), "at": intoPoint(&part.At),
		"turn": readTurn(&part.Turn), "flip": intoFlag(&part.Flip),
		"label": func(value any, place string) error {
			part.Label = new(Point)
			return intoPoint(part.Label)(value, place)
		},
		"values": func(value any, place string) (err error) {
			part.Values, err = readValues(value, place, part.Kind)
			return err
		},
	})
	return part, err
}

func readTurn(target *int) reader {
	return func(value any, place string) error {
		turn, ok := value.(float64)
		if !ok || !isTurn(int(turn)) || turn != float64(int(turn)) {
			return refuse(place, "write 0, 90, 180 or 270, clockwise as seen on the sheet")
		}
		*target = int(turn)
		return nil
	}
}

func isTurn(turn int) bool { return turn == 0 || turn == 90 || turn == 180 || turn == 270 }

func readValues(value any, place string, kind *kinds.Kind) (kinds.Values, error) {
	values := kinds.Values{}
	fields := readers{}
	for _, spec := range kind.Specs {
		fields[spec.Name] = func(value any, place string) error {
			read, err := spec.Read(value)
			if err != nil {
				return refuse(place, "%v", err)
			}
			values[spec.Name] = read
			return nil
		}
	}
	err := readFields(value, place, "the "+kind.Title, fields)
	return values, err
}

func readWire(value any, place string) (Wire, error) {
	var wire Wire
	err := readFields(value, place, "a wire", readers{"id": intoText(&wire.ID), "points": intoPoints(&wire.Points)})
	if err == nil && has(value, "id") && wire.ID == "" {
		err = refuse(under(place, "id"), "a wire's name cannot be empty; leave the field out")
	}
	return wire, err
}

func readCase(value any, place string) (Case, error) {
	c := Case{Supply: kinds.Nominal}
	err := readFields(value, place, "a case", readers{
		"name": intoText(&c.Name), "follows": intoText(&c.Follows),
		"supply": func(value any, place string) error {
			var level string
			err := intoText(&level)(value, place)
			c.Supply = kinds.Level(level)
			return err
		},
		"positions": intoNames(&c.Positions),
		"timers":    intoNames(&c.Timers),
	})
	if err == nil && has(value, "follows") && c.Follows == "" {
		err = refuse(under(place, "follows"), "name a case, or leave the field out")
	}
	return c, err
}

// nameWires gives w1, w2 … to wires without a name, leaving out names that are taken.
func nameWires(sheet *Sheet) {
	next := newWireNames(sheet)
	for i := range sheet.Wires {
		if sheet.Wires[i].ID == "" {
			sheet.Wires[i].ID = next()
		}
	}
}

// newWireNames gives the next free name of a wire at each call: w1, w2 … without those that are taken.
func newWireNames(sheet *Sheet) func() string {
	var taken map[string]bool
	number := 0
	return func() string {
		if taken == nil {
			taken = make(map[string]bool, len(sheet.Wires))
			for i := range sheet.Wires {
				taken[sheet.Wires[i].ID] = true
			}
		}
		for {
			number++
			if id := "w" + strconv.Itoa(number); !taken[id] {
				return id
			}
		}
	}
}
