package schematic

import (
	"encoding/json"
	"maps"
	"slices"
	"strconv"

	"github.com/go-json-experiment/json/jsontext"

	"loopwright/schematic/kinds"
)

// Encode writes a sheet as a sheet file. The same sheet always gives the same bytes; defaults are left out, and what
// people wrote ("4k7") stays as they wrote it.
func Encode(sheet *Sheet) []byte {
	out := []byte("{\n  \"format\": ")
	out = appendText(out, Format)
	out = appendHead(out, sheet)
	out = appendLines(out, "parts", len(sheet.Parts), func(out []byte, i int) []byte { return appendPart(out, &sheet.Parts[i]) })
	out = appendLines(out, "wires", len(sheet.Wires), func(out []byte, i int) []byte { return appendWire(out, &sheet.Wires[i]) })
	if len(sheet.Joints) > 0 {
		out = append(out, ",\n  \"joints\": "...)
		out = appendPoints(out, sheet.Joints)
	}
	if !plainCases(sheet.Cases) {
		out = appendLines(out, "cases", len(sheet.Cases), func(out []byte, i int) []byte { return appendCase(out, &sheet.Cases[i]) })
	}
	return append(out, "\n}\n"...)
}

// plainCases reports whether the cases are what a sheet without any has.
func plainCases(cases []Case) bool {
	if len(cases) != 1 {
		return false
	}
	c := cases[0]
	return c.Name == restCase && c.Supply == kinds.Nominal && c.Follows == "" && len(c.Positions) == 0 && len(c.Timers) == 0
}

// headRows lists the fields of the title block and of the settings, as they stand in the rows of a file.
func headRows() [][]string {
	return [][]string{{"title", "number", "owner", "author"}, {"system"}, {"symbols", "size", "reference"}}
}

func appendHead(out []byte, sheet *Sheet) []byte {
	for _, row := range headRows() {
		begun := false
		for _, name := range row {
			text := headField(sheet, name)
			if text == nil {
				continue
			}
			if begun {
				out = append(out, ", "...)
			} else {
				out = append(out, ",\n  "...)
			}
			out = append(appendKey(out, name), text...)
			begun = true
		}
	}
	return out
}

// headField writes one field of the title block or of the settings; nil when it is left out.
func headField(sheet *Sheet, name string) []byte {
	text := ""
	switch name {
	case "title":
		text = sheet.Title
	case "number":
		text = sheet.Number
	case "owner":
		text = sheet.Owner
	case "author":
		text = sheet.Author
	case "symbols":
		text = string(sheet.Symbols)
	case "size":
		text = sheet.Size
	case "reference":
		text = sheet.Reference
	case "system":
		return appendSystem(nil, sheet.System)
	}
	if text == "" {
		return nil
	}
	return appendText(nil, text)
}

func appendSystem(out []byte, system kinds.System) []byte {
	out = appendText(append(out, `{"kind": `...), system.Kind)
	if system.AC() {
		out = appendNumber(append(out, `, "hz": `...), system.Hertz)
	}
	return append(out, '}')
}

// appendLines writes a list with one item a line.
func appendLines(out []byte, name string, count int, item func(out []byte, i int) []byte) []byte {
	out = append(out, ",\n  "...)
	out = append(appendKey(out, name), '[')
	for i := range count {
		if i > 0 {
			out = append(out, ',')
		}
		out = item(append(out, "\n    "...), i)
	}
	if count > 0 {
		out = append(out, "\n  "...)
	}
	return append(out, ']')
}

func appendPart(out []byte, part *Part) []byte {
	out = append(out, '{')
	out = append(appendKey(out, "ref"), appendText(nil, part.Ref)...)
	out = append(out, `, "kind": `...)
	out = appendText(out, part.Kind.Name)
	out = append(out, `, "at": `...)
	out = appendPoint(out, part.At)
	if part.Turn != 0 {
		out = append(out, `, "turn": `...)
		out = strconv.AppendInt(out, int64(part.Turn), 10)
	}
	if part.Flip {
		out = append(out, `, "flip": true`...)
	}
	if part.Label != nil {
		out = append(out, `, "label": `...)
		out = appendPoint(out, *part.Label)
	}
	if values := appendValues(nil, part); len(values) > 2 {
		out = append(append(out, `, "values": `...), values...)
	}
	return append(out, '}')
}

// appendValues writes the values of a part in the order of its kind, without those that say no more than the default.
func appendValues(out []byte, part *Part) []byte {
	out = append(out, '{')
	for _, spec := range part.Kind.Specs {
		value, given := part.Values[spec.Name]
		if !given || isDefault(spec, value) {
			continue
		}
		if len(out) > 1 {
			out = append(out, ", "...)
		}
		out = appendValue(appendKey(out, spec.Name), value)
	}
	return append(out, '}')
}

func isDefault(spec kinds.Spec, value kinds.Value) bool {
	return !spec.Required && !spec.Optional && value.Same(spec.Default)
}

func appendWire(out []byte, wire *Wire) []byte {
	out = append(appendKey(append(out, '{'), "id"), appendText(nil, wire.ID)...)
	out = append(out, `, "points": `...)
	return append(appendPoints(out, wire.Points), '}')
}

func appendCase(out []byte, c *Case) []byte {
	out = append(appendKey(append(out, '{'), "name"), appendText(nil, c.Name)...)
	if c.Follows != "" {
		out = append(out, `, "follows": `...)
		out = appendText(out, c.Follows)
	}
	out = appendNames(out, "positions", c.Positions)
	if c.Supply != kinds.Nominal {
		out = append(out, `, "supply": `...)
		out = appendText(out, string(c.Supply))
	}
	out = appendNames(out, "timers", c.Timers)
	return append(out, '}')
}

func appendNames(out []byte, name string, names map[string]string) []byte {
	if len(names) == 0 {
		return out
	}
	out = append(appendKey(append(out, ", "...), name), '{')
	for i, key := range slices.Sorted(maps.Keys(names)) {
		if i > 0 {
			out = append(out, ", "...)
		}
		out = append(append(appendText(out, key), ": "...), appendText(nil, names[key])...)
	}
	return append(out, '}')
}

func appendKey(out []byte, name string) []byte { return append(appendText(out, name), ": "...) }

func appendPoint(out []byte, p Point) []byte {
	out = strconv.AppendInt(append(out, '['), int64(p.X), 10)
	out = strconv.AppendInt(append(out, ", "...), int64(p.Y), 10)
	return append(out, ']')
}

func appendPoints(out []byte, points []Point) []byte {
	out = append(out, '[')
	for i, p := range points {
		if i > 0 {
			out = append(out, ", "...)
		}
		out = appendPoint(out, p)
	}
	return append(out, ']')
}

func appendNumber(out []byte, number float64) []byte {
	data, err := json.Marshal(number)
	if err != nil {
		return append(out, '0') // numbers on a sheet are finite
	}
	return append(out, data...)
}

// appendText writes a text as JSON with no more escapes than it needs. Text on a sheet is UTF-8; in any other, what
// cannot be read is replaced.
func appendText(out []byte, text string) []byte {
	out, _ = jsontext.AppendQuote(out, text)
	return out
}

// appendTexts writes a list of texts.
func appendTexts(out []byte, texts []string) []byte {
	out = append(out, '[')
	for i, text := range texts {
		if i > 0 {
			out = append(out, ", "...)
		}
		out = appendText(out, text)
	}
	return append(out, ']')
}

// appendValue writes a value as it was written.
func appendValue(out []byte, value kinds.Value) []byte {
	switch {
	case value.Form == kinds.Flag:
		return strconv.AppendBool(out, value.Yes)
	case value.Form == kinds.Names:
		return appendTexts(out, value.Names)
	case value.Form == kinds.Quantity && value.Written == "":
		return appendNumber(out, value.Number)
	}
	return appendText(out, value.Written)
}
