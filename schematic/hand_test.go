package schematic_test

import (
	"encoding/json"
	"fmt"

	"loopwright/schematic"
	"loopwright/schematic/kinds"
)

// hand draws random edits in a small corner of a sheet, so that things meet often.
type hand struct {
	pick    func(n int) int
	refused func(sheet *schematic.Sheet, edit map[string]any, err error) // told of what is refused, unless it is nil
}

func (h hand) point() [2]int { return [2]int{h.pick(14), h.pick(12)} }

func (h hand) chain() [][2]int {
	points := [][2]int{h.point()}
	for range 1 + h.pick(3) {
		last := points[len(points)-1]
		next := h.point()
		if h.pick(2) == 0 {
			next[0] = last[0]
		} else {
			next[1] = last[1]
		}
		points = append(points, next)
	}
	return points
}

func (h hand) by(most int) [2]int { return [2]int{h.pick(2*most+1) - most, h.pick(2*most+1) - most} }

func (h hand) ref(sheet *schematic.Sheet) string {
	if len(sheet.Parts) == 0 {
		return "R9"
	}
	return sheet.Parts[h.pick(len(sheet.Parts))].Ref
}

func (h hand) wire(sheet *schematic.Sheet) string {
	if len(sheet.Wires) == 0 {
		return "w9"
	}
	return sheet.Wires[h.pick(len(sheet.Wires))].ID
}

func (h hand) some(from func(*schematic.Sheet) string, sheet *schematic.Sheet) []string {
	list := []string{}
	for range h.pick(4) {
		list = append(list, from(sheet))
	}
	return list
}

func (h hand) caseName(sheet *schematic.Sheet) string {
	return sheet.Cases[h.pick(len(sheet.Cases))].Name
}

func (h hand) joint(sheet *schematic.Sheet) [2]int {
	places := schematic.Join(sheet).Crossings
	if len(places) == 0 {
		return h.point()
	}
	p := places[h.pick(len(places))]
	return [2]int{p.X, p.Y}
}

// edit is one random edit as the API takes it. Many make no sense and must be refused.
func (h hand) edit(sheet *schematic.Sheet) map[string]any {
	n := h.pick(24)
	if len(sheet.Parts) < 3 {
		n = min(n, 6) // there is little else to do on an empty sheet
	}
	switch n {
	case 0, 1, 2:
		all := kinds.All()
		kind := all[h.pick(len(all))]
		values := kind.Tray[h.pick(len(kind.Tray))].Values
		if values == nil {
			values = kinds.Values{}
		}
		return map[string]any{"do": "add", "part": map[string]any{"kind": kind.Name, "at": h.point(), "turn": 90 * h.pick(4),
			"flip": h.pick(2) == 1, "values": values}}
	case 3, 4, 5, 6:
		return map[string]any{"do": "wire", "points": h.chain()}
	case 7, 8, 9:
		return map[string]any{"do": "move", "refs": []string{h.ref(sheet)}, "by": h.by(4)}
	case 10, 11:
		return map[string]any{"do": "move", "refs": h.some(h.ref, sheet), "wires": h.some(h.wire, sheet), "by": h.by(3)}
	case 12:
		return map[string]any{"do": []string{"turn", "flip"}[h.pick(2)], "refs": h.some(h.ref, sheet)}
	case 13:
		return map[string]any{"do": "remove", "refs": []string{h.ref(sheet)}, "wires": h.some(h.wire, sheet)[:0]}
	case 14, 15:
		return map[string]any{"do": "joint", "at": h.joint(sheet)}
	case 16:
		return map[string]any{"do": "rename", "ref": h.ref(sheet), "to": fmt.Sprintf("Q%d", h.pick(6))}
	case 17:
		return map[string]any{"do": "reroute", "wire": h.wire(sheet), "points": h.chain()}
	}
	return h.quietEdit(sheet)
}

// quietEdit is a random edit that changes nothing of the drawing.
func (h hand) quietEdit(sheet *schematic.Sheet) map[string]any {
	switch h.pick(8) {
	case 0:
		positions := map[string]string{h.ref(sheet): []string{"operated", "rest", "left"}[h.pick(3)]}
		made := map[string]any{"name": fmt.Sprintf("Case %d", h.pick(3)), "positions": positions, "follows": h.caseName(sheet)}
		return map[string]any{"do": "case", "case": made, "after": h.caseName(sheet)}
	case 1:
		return map[string]any{"do": "operate", "case": h.caseName(sheet), "ref": h.ref(sheet), "position": "operated"}
	case 2:
		names := []string{}
		for _, c := range sheet.Cases {
			names = append(names, c.Name)
		}
		i := h.pick(len(names))
		names[0], names[i] = names[i], names[0]
		return map[string]any{"do": "order-cases", "names": names}
	case 3:
		return map[string]any{"do": "remove-case", "name": h.caseName(sheet)}
	case 4:
		return map[string]any{"do": "rename-case", "name": h.caseName(sheet), "to": fmt.Sprintf("Case %d", h.pick(3))}
	case 5:
		values := []map[string]any{{"resistance": "4k7"}, {"resistance": nil}, {"positions": []string{"left", "right"}, "closed_in": []string{"left"}},
			{"voltage": 24}, {"name": "0V"}, {"blown": true}}
		return map[string]any{"do": "set", "ref": h.ref(sheet), "values": values[h.pick(len(values))]}
	case 6:
		return map[string]any{"do": "label", "ref": h.ref(sheet), "at": h.point()}
	}
	return map[string]any{"do": "sheet", "set": map[string]any{"title": fmt.Sprintf("Title %d", h.pick(3)), "reference": h.ref(sheet) + ":2"}}
}

// step is one edit that has been taken.
type step struct {
	before, after *schematic.Sheet
	edit          map[string]any
	change        *schematic.Change
	made          schematic.Made
}

func (s step) String() string {
	text, _ := json.Marshal(s.edit)
	return fmt.Sprintf("%s\nbefore %s\nafter %s", text, schematic.Encode(s.before), schematic.Encode(s.after))
}

// play makes up to n random edits, and calls each for those that are taken.
func play(h hand, n int, each func(step)) *schematic.Sheet {
	sheet := schematic.New("random")
	for range n {
		edit := h.edit(sheet)
		text, _ := json.Marshal([]any{edit})
		edits, err := schematic.DecodeEdits(text)
		if err != nil {
			continue
		}
		after, change, made, err := schematic.Apply(sheet, edits)
		if err != nil {
			if h.refused != nil {
				h.refused(sheet, edit, err)
			}
			continue
		}
		each(step{sheet, after, edit, change, made})
		sheet = after
	}
	return sheet
}
