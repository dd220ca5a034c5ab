package draw

import (
	"context"
	"fmt"
	"io/fs"
	"math"
	"strings"
	"testing"

	"loopwright/schematic"
	"loopwright/schematic/cases"
	"loopwright/schematic/kinds"
	"loopwright/schematic/stroke"
	"loopwright/testdata"
)

// lines are the straight stretches that a shape is drawn with, circles and arcs in short pieces.
func lines(shape stroke.Shape) [][2]stroke.Point {
	var points []stroke.Point
	switch s := shape.(type) {
	case stroke.Path:
		points = append(points, s.Points...)
		if s.Closed {
			points = append(points, s.Points[0])
		}
	case stroke.Circle:
		for i := range 37 {
			points = append(points, onCircle(s.Center, s.Radius, float64(10*i)))
		}
	case stroke.Arc:
		for i := range 37 {
			points = append(points, onCircle(s.Center, s.Radius, s.Start+s.Sweep*float64(i)/36))
		}
	}
	var list [][2]stroke.Point
	for i := 1; i < len(points); i++ {
		list = append(list, [2]stroke.Point{points[i-1], points[i]})
	}
	return list
}

// cuts reports whether a stretch passes through a box, by clipping it (the method of Liang and Barsky).
func cuts(line [2]stroke.Point, box stroke.Box) bool {
	from, to := 0.0, 1.0
	dx, dy := line[1].X-line[0].X, line[1].Y-line[0].Y
	for _, edge := range [...][2]float64{
		{-dx, line[0].X - box.Left}, {dx, box.Right - line[0].X}, {-dy, line[0].Y - box.Top}, {dy, box.Bottom - line[0].Y},
	} {
		switch {
		case edge[0] == 0 && edge[1] < 0:
			return false
		case edge[0] < 0:
			from = math.Max(from, edge[1]/edge[0])
		case edge[0] > 0:
			to = math.Min(to, edge[1]/edge[0])
		}
	}
	return from < to
}

// ink is the box of the ink of a text: its capitals and what hangs below them.
func ink(text stroke.Text) stroke.Box {
	box := textBox(text)
	box.Top, box.Bottom = baseline(text)-capHeight*text.Height, baseline(text)+0.2*text.Height
	return box
}

// thing is a text or a line of a drawing, with the group that it belongs to.
type thing struct {
	group string
	text  string
	box   stroke.Box
	line  [2]stroke.Point
}

// taken apart, a drawing is its lettering and its lines. What a symbol is drawn with counts as lines only.
func takenApart(picture *Picture, sheet *schematic.Sheet, result *cases.Result, shown int) (texts, drawn []thing) {
	own := map[string]int{}
	for i := range sheet.Parts {
		part := &sheet.Parts[i]
		position, ok := result.Cases[shown].Positions[part.Ref]
		if !ok {
			position = kinds.Rest
		}
		s := placed(part, sheet.Symbols, position)
		own["part-"+part.Ref] = len(s.list)
	}
	for _, group := range picture.Groups {
		if group.Layer == PaperLayer {
			continue
		}
		for i, shape := range group.List {
			text, isText := shape.(stroke.Text)
			if isText && i >= own[group.ID] {
				texts = append(texts, thing{group: group.ID, text: text.Text, box: ink(text)})
			}
			for _, line := range lines(shape) {
				drawn = append(drawn, thing{group: group.ID, line: line})
			}
		}
	}
	return texts, drawn
}

// collisions says which lettering lies on what.
func collisions(picture *Picture, sheet *schematic.Sheet, result *cases.Result, shown int) []string {
	var list []string
	texts, drawn := takenApart(picture, sheet, result, shown)
	paper := paperOf(sheet.Size)
	space, title := paper.space(), paper.titleBox()
	for i, text := range texts {
		for _, other := range texts[:i] {
			if text.box.Overlaps(other.box) && text.group != other.group {
				list = append(list, fmt.Sprintf("%q of %s lies on %q of %s", text.text, text.group, other.text, other.group))
			}
		}
		for _, other := range drawn {
			if cuts(other.line, text.box) {
				list = append(list, fmt.Sprintf("%q of %s lies on a line of %s", text.text, text.group, other.group))
				break
			}
		}
		if text.box.Around(space) != space || text.box.Overlaps(title) {
			list = append(list, fmt.Sprintf("%q of %s lies on the frame or the title block", text.text, text.group))
		}
	}
	return list
}

// demoSheets are the demo sheets by name.
func demoSheets(t testing.TB) map[string]*schematic.Sheet {
	t.Helper()
	names, err := fs.Glob(testdata.Demo, "demo/*.sheet.json")
	if err != nil || len(names) == 0 {
		t.Fatalf("no demo sheets: %v", err)
	}
	sheets := map[string]*schematic.Sheet{}
	for _, name := range names {
		data, err := testdata.Demo.ReadFile(name)
		if err != nil {
			t.Fatal(err)
		}
		sheets[strings.TrimSuffix(strings.TrimPrefix(name, "demo/"), ".sheet.json")] = decoded(t, string(data))
	}
	return sheets
}

func solved(t testing.TB, sheet *schematic.Sheet) *cases.Result {
	t.Helper()
	result, err := cases.Solve(context.Background(), sheet)
	if err != nil {
		t.Fatal(err)
	}
	return result
}

func TestNoLetteringOfTheDemoSheetsLiesOnAnything(t *testing.T) {
	sheets := demoSheets(t)
	for name, text := range map[string]string{"pump": pump, "quarrel": quarrel, "bridge": bridge} {
		sheets[name] = decoded(t, text)
	}
	for name, sheet := range sheets {
		for _, set := range []kinds.SymbolSet{kinds.IEC, kinds.ANSI} {
			sheet.Symbols = set
			result := solved(t, sheet)
			for shown := range sheet.Cases {
				picture := Compose(sheet, result, Options{Case: shown, Meshes: true, Interactive: true, Date: "2026-12-01"})
				keep(t, fmt.Sprintf("%s-%s%d", name, set, shown), picture.AppendSVG(nil))
				for _, says := range collisions(picture, sheet, result, shown) {
					t.Errorf("%s, %s, case %d: %s", name, set, shown, says)
				}
			}
		}
	}
}

func TestNoLetteringOfScatteredSheetsLiesOnAnything(t *testing.T) {
	for seed := range uint64(60) {
		sheet := scattered(seed, 40, "A3")
		result := sampled(sheet, 0, seed)
		picture := Compose(sheet, result, Options{Meshes: true, Interactive: true})
		if seed < 10 {
			keep(t, fmt.Sprintf("scattered-%d", seed), picture.AppendSVG(nil))
		}
		for _, says := range collisions(picture, sheet, result, 0) {
			t.Errorf("seed %d: %s", seed, says)
		}
	}
}

func TestNoLetteringOfLaddersLiesOnAnything(t *testing.T) {
	sheet := ladders(120)
	result := sampled(sheet, 0, 3)
	picture := Compose(sheet, result, Options{Meshes: true, Interactive: true})
	keep(t, "ladders", picture.AppendSVG(nil))
	for _, says := range collisions(picture, sheet, result, 0) {
		t.Error(says)
	}
}
