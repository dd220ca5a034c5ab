package schematic

import (
	"fmt"
	"slices"
)

// Edit is one thing that somebody does to a sheet, as the edit API words it. Which fields count depends on Do.
type Edit struct {
	Do     string
	Part   *Part    // add
	Refs   []string // move, turn, flip, remove
	Wires  []string // move, remove
	By     Point    // move
	Ref    string   // set, rename, label, operate
	To     string   // rename, rename-case
	Values any      // set: the values as JSON; null brings a default back
	Wire   string   // reroute
	Points []Point  // wire, reroute
	At     *Point   // joint, remove-joint, label; nil gives a label back to the placer
	Case   *Case    // case
	After  string   // case: the case that it is to stand behind; empty leaves it in its place, or puts a new one last
	Name   string   // rename-case, remove-case, and the case of operate
	Names  []string // order-cases
	// Position is where operate puts a part.
	Position string
	// Set holds the fields of the title block and of the sheet's settings that sheet changes.
	Set any
}

// Made tells what a batch of edits brought about beside what it said.
type Made struct {
	Refs   []string // of new parts, in the order of the edits
	Wires  []string // of new wires
	Joined []string // a sentence for each thing that is joined now and was not before
}

// ConflictError says that what an edit is about is not there, or not as it was.
type ConflictError struct{ Message string }

func (e *ConflictError) Error() string { return e.Message }

func conflict(format string, arguments ...any) error {
	return &ConflictError{fmt.Sprintf(format, arguments...)}
}

// DecodeEdits reads a list of edits. The error is a *PlaceError that names the edit, or a *SyntaxError.
func DecodeEdits(data []byte) ([]Edit, error) {
	tree, err := parse(data)
	if err != nil {
		return nil, err
	}
	var edits []Edit
	err = list(tree, "edits", func(item any, place string) error {
		edit, err := readEdit(item, place)
		edits = append(edits, edit)
		return err
	})
	if err == nil && len(edits) == 0 {
		err = refuse("edits", "there is no edit in the list")
	}
	return edits, err
}

// editFields lists the fields of each edit; those in front of the bar must be given.
var editFields = map[string]struct{ needed, optional []string }{
	"add":          {[]string{"part"}, nil},
	"move":         {[]string{"by"}, []string{"refs", "wires"}},
	"turn":         {[]string{"refs"}, nil},
	"flip":         {[]string{"refs"}, nil},
	"set":          {[]string{"ref", "values"}, nil},
	"rename":       {[]string{"ref", "to"}, nil},
	"remove":       {nil, []string{"refs", "wires"}},
	"wire":         {[]string{"points"}, nil},
	"reroute":      {[]string{"wire", "points"}, nil},
	"joint":        {[]string{"at"}, nil},
	"remove-joint": {[]string{"at"}, nil},
	"label":        {[]string{"ref"}, []string{"at"}},
	"case":         {[]string{"case"}, []string{"after"}},
	"operate":      {[]string{"case", "ref", "position"}, nil},
	"rename-case":  {[]string{"name", "to"}, nil},
	"order-cases":  {[]string{"names"}, nil},
	"remove-case":  {[]string{"name"}, nil},
	"sheet":        {[]string{"set"}, nil},
	"undo":         {nil, nil},
	"redo":         {nil, nil},
}

func readEdit(item any, place string) (Edit, error) {
	var edit Edit
	members, ok := item.(object)
	if !ok {
		return edit, refuse(place, "write an edit as an object in braces")
	}
	for _, m := range members {
		if m.key == "do" {
			edit.Do, _ = m.value.(string)
		}
	}
	fields, known := editFields[edit.Do]
	if !known {
		return edit, refuse(under(place, "do"), "there is no edit %q", edit.Do)
	}
	for _, name := range fields.needed {
		if !has(item, name) {
			return edit, refuse(under(place, name), "the edit %q needs this field", edit.Do)
		}
	}
	all := edit.readers()
	mine := readers{"do": all["do"]}
	for _, name := range slices.Concat(fields.needed, fields.optional) {
		mine[name] = all[name]
	}
	if edit.Do == "operate" {
		mine["case"] = intoText(&edit.Name)
	}
	return edit, readFields(item, place, fmt.Sprintf("the edit %q", edit.Do), mine)
}

func (e *Edit) readers() readers {
	keep := func(target *any) reader {
		return func(value any, _ string) error { *target = value; return nil }
	}
	return readers{
		"do": intoText(&e.Do), "refs": intoTexts(&e.Refs), "wires": intoTexts(&e.Wires), "by": intoPoint(&e.By),
		"ref": intoText(&e.Ref), "to": intoText(&e.To), "values": keep(&e.Values), "wire": intoText(&e.Wire),
		"points": intoPoints(&e.Points), "name": intoText(&e.Name), "names": intoTexts(&e.Names), "after": intoText(&e.After),
		"position": intoText(&e.Position), "set": keep(&e.Set),
		"at": func(value any, place string) error {
			e.At = new(Point)
			return intoPoint(e.At)(value, place)
		},
		"part": func(value any, place string) error {
			part, err := readPart(value, place, false)
			e.Part = &part
			return err
		},
		"case": func(value any, place string) error {
			c, err := readCase(value, place)
			e.Case = &c
			return err
		},
	}
}
