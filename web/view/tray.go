package view

import (
	"encoding/json"
	"fmt"
	"strings"

	"loopwright/schematic/draw"
	"loopwright/schematic/kinds"
)

// BuildTray offers every kind that can be put on a sheet of the given system, in the given symbols.
func BuildTray(system kinds.System, set kinds.SymbolSet) []TrayGroup {
	var groups []TrayGroup
	for _, name := range kinds.Groups() {
		group := TrayGroup{Name: string(name)}
		for _, kind := range kinds.All() {
			if kind.Group != name || (system.AC() && kind.DCOnly) || (!system.AC() && kind.ACOnly) {
				continue
			}
			for _, entry := range kind.Tray {
				group.Entries = append(group.Entries, trayEntry(kind, entry, set))
			}
		}
		if len(group.Entries) > 0 {
			groups = append(groups, group)
		}
	}
	return groups
}

func trayEntry(kind *kinds.Kind, entry kinds.Entry, set kinds.SymbolSet) TrayEntry {
	values := "{}"
	if len(entry.Values) > 0 {
		// Values hold numbers, texts and lists only, which always can be written.
		data, _ := json.Marshal(entry.Values)
		values = string(data)
	}
	words := append([]string{kind.Name, kind.Title, entry.Title}, kind.Words...)
	reach := make([]string, len(kind.Pins))
	for i, pin := range kind.Pins {
		reach[i] = fmt.Sprintf("%d,%d", pin.X, pin.Y)
	}
	return TrayEntry{
		Kind: kind.Name, Title: entry.Title, Values: values,
		Find:   strings.ToLower(strings.Join(words, " ")),
		Symbol: draw.SymbolSVG(kind, entry.Values, set),
		Reach:  strings.Join(reach, " "),
	}
}
