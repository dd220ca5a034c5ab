package draw

import (
	"encoding/xml"
	"errors"
	"flag"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"loopwright/schematic/kinds"
	"loopwright/schematic/stroke"
)

var out = flag.String("out", "", "directory to which the drawings of the tests are written, to be looked at")

// keep writes a drawing where somebody wants to look at it, and holds that it is well-formed.
func keep(t *testing.T, name string, svg []byte) {
	t.Helper()
	decoder := xml.NewDecoder(strings.NewReader(string(svg)))
	for {
		if _, err := decoder.Token(); errors.Is(err, io.EOF) {
			break
		} else if err != nil {
			t.Fatalf("%s is not well-formed: %v", name, err)
		}
	}
	if *out == "" {
		return
	}
	if err := os.WriteFile(filepath.Join(*out, name+".svg"), svg, 0o644); err != nil {
		t.Fatal(err)
	}
}

// variants are all the looks of a kind: its entries in the tray and its actuators, in each of its positions.
func variants(kind *kinds.Kind, set kinds.SymbolSet) []kinds.Look {
	var looks []kinds.Look
	add := func(values kinds.Values) {
		filled := kind.Fill(values)
		positions := []string{kinds.Rest}
		if kind.Positions != nil {
			positions = kind.Positions(filled)
		}
		for _, position := range positions {
			closed := kind.Closed == nil || kind.Closed(filled, position)
			looks = append(looks, kinds.Look{Values: filled, Set: set, Position: position, Closed: closed})
		}
	}
	if spec, ok := kind.Spec("actuator"); ok {
		for _, form := range []string{"make", "break"} {
			for _, actuator := range spec.Choices {
				add(kinds.Values{"form": kinds.Word(kinds.Choice, form), "actuator": kinds.Word(kinds.Choice, actuator)})
			}
		}
		return looks
	}
	for _, entry := range kind.Tray {
		add(entry.Values)
	}
	if kind == kinds.Earth {
		add(kinds.Values{"name": kinds.Word(kinds.Text, "FE")})
	}
	return looks
}

func TestEverySymbolIsDrawnInEveryTurnAndState(t *testing.T) {
	for _, set := range []kinds.SymbolSet{kinds.IEC, kinds.ANSI} {
		var list stroke.List
		row := 0
		for _, kind := range kinds.All() {
			for _, look := range variants(kind, set) {
				at := stroke.Point{X: 2 + float64(row%2)*58, Y: 3 + float64(row/2)*6}
				row++
				says := kind.Name + " " + look.Position
				if kind == kinds.Switch {
					says = look.Values.Word("actuator") + " " + look.Values.Word("form") + " " + look.Position
				}
				list = append(list, stroke.Text{At: at, Text: says, Height: 0.7, Centred: true})
				for i := range 8 {
					look.Turn, look.Flip = i%4*90, i >= 4
					place := stroke.Point{X: at.X + 14 + 5.6*float64(i), Y: at.Y}
					drawn := kind.Symbol(look).Placed(place, look.Turn, look.Flip)
					if len(drawn) == 0 {
						t.Errorf("%s: nothing is drawn", says)
					}
					list = append(list, drawn...)
				}
			}
		}
		picture := Picture{Title: "Symbols", Width: 620, Height: 40 + 30*float64(row/2+1), OriginX: originX, OriginY: originY}
		picture.Groups = []Group{{ID: "all", Layer: PartLayer, List: list}}
		keep(t, "symbols-"+string(set), picture.AppendSVG(nil))
	}
}

func TestTheTrayShowsEverySymbol(t *testing.T) {
	for _, set := range []kinds.SymbolSet{kinds.IEC, kinds.ANSI} {
		var page strings.Builder
		for _, kind := range kinds.All() {
			for _, entry := range kind.Tray {
				svg := SymbolSVG(kind, entry.Values, set)
				keep(t, "one", []byte(svg))
				if !strings.Contains(svg, `aria-hidden="true"`) || !strings.Contains(svg, "<path") && !strings.Contains(svg, "<circle") {
					t.Errorf("%s: %s", kind.Name, svg)
				}
				fmt.Fprintf(&page, `<div style="display:inline-grid;justify-items:center;margin:8px;font:12px DejaVu Sans">`+
					`<div style="width:42px;height:42px;padding:3px;border:1px solid #999">%s</div>%s</div>`, svg, entry.Title)
			}
		}
		if *out != "" {
			if err := os.WriteFile(filepath.Join(*out, "tray-"+string(set)+".html"), []byte(page.String()), 0o644); err != nil {
				t.Fatal(err)
			}
		}
	}
}
