package draw

import (
	"encoding/json"

	"loopwright/schematic"
	"loopwright/schematic/kinds"
)

// makeInteractive adds what a pointer, a key or a screen reader needs of a part.
func (l *layout) makeInteractive(group *Group, i int) {
	s := &l.symbols[i]
	if s.part.Kind.Positions != nil {
		// A click operates a switch; a fuse is not blown by looking at it.
		if s.part.Kind.Group == kinds.Operate {
			group.Attributes = append(group.Attributes, Attribute{"data-operates", "true"})
		}
		group.Attributes = append(group.Attributes,
			Attribute{"data-positions", jsonList(s.part.Kind.Positions(s.part.Fill()))},
			Attribute{"data-position", l.solved.Positions[s.part.Ref]})
	}
	if name, value, ok := principal(s.part); ok {
		group.Attributes = append(group.Attributes, Attribute{"data-principal", name}, Attribute{"data-value", value})
	}
	group.Attributes = append(group.Attributes,
		Attribute{"tabindex", "0"}, Attribute{"role", "group"}, Attribute{"aria-label", s.spoken(l.readings[i])})
	hit := s.hit()
	group.Hit = &hit
	for _, pin := range s.part.Kind.Pins {
		group.Handles = append(group.Handles, Handle{s.part.Ref + ":" + pin.Name, onGrid(s.part.Pin(pin))})
	}
}

// principal is the value that is typed where the part stands on the drawing: the first quantity of its kind, or its name.
func principal(part *schematic.Part) (name, value string, ok bool) {
	for _, spec := range part.Kind.Specs {
		given, has := part.Values[spec.Name]
		switch {
		case spec.Form == kinds.Text:
			return spec.Name, part.Fill().Word(spec.Name), true
		case spec.Form != kinds.Quantity:
			continue
		case given.Written != "":
			return spec.Name, given.Written, true
		case has || !spec.Optional && !spec.Required:
			return spec.Name, part.Fill().Exact(spec.Name), true
		}
		return spec.Name, "", true
	}
	return "", "", false
}

// jsonList writes texts as a JSON list.
func jsonList(texts []string) string {
	data, err := json.Marshal(texts)
	if err != nil {
		return "[]" // texts can always be written
	}
	return string(data)
}
