package draw

import (
	"bytes"
	"encoding/xml"
	"errors"
	"io"
	"math/cmplx"
	"slices"
	"strconv"
	"strings"
	"testing"

	"loopwright/schematic"
	"loopwright/schematic/cases"
	"loopwright/schematic/kinds"
	"loopwright/schematic/quantity"
	"loopwright/schematic/trace"
)

// element is one element of an SVG, with the text directly in it.
type element struct {
	name       string
	attributes map[string]string
	text       string
	children   []*element
}

// parsed reads an SVG as a tree.
func parsed(t testing.TB, svg []byte) *element {
	t.Helper()
	root := &element{}
	open := []*element{root}
	decoder := xml.NewDecoder(bytes.NewReader(svg))
	for {
		token, err := decoder.Token()
		if errors.Is(err, io.EOF) {
			return root.children[0]
		}
		if err != nil {
			t.Fatal(err)
		}
		top := open[len(open)-1]
		switch token := token.(type) {
		case xml.StartElement:
			child := &element{name: token.Name.Local, attributes: map[string]string{}}
			for _, attribute := range token.Attr {
				child.attributes[attribute.Name.Local] = attribute.Value
			}
			top.children = append(top.children, child)
			open = append(open, child)
		case xml.EndElement:
			open = open[:len(open)-1]
		case xml.CharData:
			top.text += string(token)
		}
	}
}

// all lists the elements that have an attribute, in order.
func (e *element) all(attribute string) []*element {
	var list []*element
	if _, ok := e.attributes[attribute]; ok {
		list = append(list, e)
	}
	for _, child := range e.children {
		list = append(list, child.all(attribute)...)
	}
	return list
}

// written is all text within the element.
func (e *element) written() []string {
	var list []string
	if e.text != "" {
		list = append(list, e.text)
	}
	for _, child := range e.children {
		list = append(list, child.written()...)
	}
	return list
}

func drawnCase(t testing.TB, sheet *schematic.Sheet, result *cases.Result, shown int) *element {
	t.Helper()
	return parsed(t, Compose(sheet, result, Options{Case: shown, Meshes: true, Interactive: true}).AppendSVG(nil))
}

func TestThePageFindsEveryThingByItsHook(t *testing.T) {
	for name, sheet := range demoSheets(t) {
		result := solved(t, sheet)
		for shown := range sheet.Cases {
			root := drawnCase(t, sheet, result, shown)
			if root.attributes["id"] != "sheet" || root.attributes["data-step"] != "20" || root.attributes["data-origin"] != "100 60" {
				t.Errorf("%s: the drawing has the attributes %v", name, root.attributes)
			}
			parts, pins := root.all("data-part"), root.all("data-pin")
			wanted := 0
			for i := range sheet.Parts {
				part := &sheet.Parts[i]
				wanted += len(part.Kind.Pins)
				if parts[i].attributes["data-part"] != part.Ref || parts[i].attributes["data-kind"] != part.Kind.Name || parts[i].attributes["id"] != "part-"+part.Ref {
					t.Errorf("%s: %s has the attributes %v", name, part.Ref, parts[i].attributes)
				}
				called, _, _ := strings.Cut(parts[i].attributes["aria-label"], ", ")
				if !slices.Contains(parts[i].written(), called) || part.Kind.Joins == nil && called != "-"+part.Ref {
					t.Errorf("%s: %s is called %q but shows %q", name, part.Ref, called, parts[i].written())
				}
			}
			if len(parts) != len(sheet.Parts) || len(pins) != wanted {
				t.Errorf("%s: %d parts and %d pins, want %d and %d", name, len(parts), len(pins), len(sheet.Parts), wanted)
			}
			for i, wire := range root.all("data-wire") {
				if wire.attributes["data-wire"] != sheet.Wires[i].ID || wire.attributes["data-potential"] != result.Drawing.Potentials[result.Drawing.WirePotential[i]].Number {
					t.Errorf("%s: wire %d has the attributes %v", name, i, wire.attributes)
				}
			}
			if len(root.all("data-wire")) != len(sheet.Wires) {
				t.Errorf("%s: %d wires are drawn", name, len(root.all("data-wire")))
			}
			seen := map[string]bool{}
			for _, e := range root.all("id") {
				if id := e.attributes["id"]; seen[id] || strings.Contains(id, " ") {
					t.Errorf("%s: the id %q is there twice, or has a space", name, id)
				} else {
					seen[id] = true
				}
			}
			for _, layer := range []string{"paper", "meshes", "wires", "joins", "parts", "marks"} {
				if !seen["layer-"+layer] {
					t.Errorf("%s: the layer %s is missing", name, layer)
				}
			}
		}
	}
}

func TestEveryNumberOfTheDrawingIsThatOfTheSolution(t *testing.T) {
	sheets := demoSheets(t)
	sheets["bridge"] = decoded(t, bridge)
	for name, sheet := range sheets {
		result := solved(t, sheet)
		for shown := range sheet.Cases {
			root := drawnCase(t, sheet, result, shown)
			c, ac := &result.Cases[shown], sheet.System.AC()
			for b, branch := range result.Drawing.Branches {
				part := root.all("data-part")[branch.Part]
				checkNumber(t, name+" "+branch.Ref, part.attributes["data-current"], c.Branches[b].Current, ac)
				if !c.Branches[b].Floating {
					checkNumber(t, name+" "+branch.Ref, part.attributes["data-voltage"], c.Branches[b].Voltage, ac)
				}
				magnitude := quantity.Format(cmplx.Abs(c.Branches[b].Current), quantity.Ampere, 4)
				shownAs := func(text string) bool { return text == magnitude || strings.HasPrefix(text, magnitude+" ∠") }
				if cmplx.Abs(c.Branches[b].Current) > 1e-9 && !slices.ContainsFunc(part.written(), shownAs) {
					t.Errorf("%s: %s shows %q, want %q", name, branch.Ref, part.written(), magnitude)
				}
			}
			for _, mesh := range root.all("data-mesh") {
				i := slices.IndexFunc(result.Drawing.Meshes, func(m trace.Mesh) bool { return m.Name == mesh.attributes["data-mesh"] })
				checkNumber(t, name+" "+mesh.attributes["data-mesh"], mesh.attributes["data-current"], c.Meshes[i], ac)
			}
		}
	}
}

func checkNumber(t *testing.T, of, text string, want complex128, ac bool) {
	t.Helper()
	got, err := strconv.ParseFloat(text, 64)
	if value := map[bool]float64{false: real(want), true: cmplx.Abs(want)}[ac]; err != nil || got != value {
		t.Errorf("%s: the drawing says %q, the solution %v", of, text, value)
	}
}

func TestTextThatPeopleWriteCannotBreakTheDrawing(t *testing.T) {
	const nasty = `<script>alert("1")</script> & 'x' ]]> --> ￾`
	sheet := decoded(t, pump)
	sheet.Title, sheet.Owner, sheet.Author, sheet.Number = nasty, nasty, nasty, nasty
	sheet.Cases[0].Name = nasty
	part := sheet.Part("V1")
	part.Values = kinds.Values{"name": kinds.Word(kinds.Text, nasty)}
	result := solved(t, sheet)
	picture := Compose(sheet, result, Options{Interactive: true, Meshes: true, Checked: nasty, Date: nasty, Revision: nasty})
	root := parsed(t, picture.AppendSVG(nil))
	clean := strings.ReplaceAll(nasty, "￾", "")
	for _, e := range root.all("data-part") {
		if e.attributes["data-part"] == "V1" && (e.written()[0] != clean || !strings.HasPrefix(e.attributes["aria-label"], clean)) {
			t.Errorf("the name reads back as %q and %q", e.written(), e.attributes["aria-label"])
		}
	}
	if strings.Contains(string(picture.AppendSVG(nil)), "<script") {
		t.Error("an element came out of a text")
	}
}

func TestAGroupAloneIsWrittenAsWithinTheDrawing(t *testing.T) {
	sheet := decoded(t, pump)
	picture := Compose(sheet, solved(t, sheet), Options{Interactive: true, Meshes: true})
	whole := picture.AppendSVG(nil)
	layer := 0
	for i := range picture.Groups {
		group := &picture.Groups[i]
		if !bytes.Contains(whole, group.AppendSVG(nil)) {
			t.Errorf("%s differs", group.ID)
		}
		at := slices.Index(layers[:], group.Layer)
		if at < layer {
			t.Errorf("%s lies in the layer %s after a higher one", group.ID, group.Layer)
		}
		layer = at
	}
}

func TestTheSameSheetGivesTheSameDrawing(t *testing.T) {
	sheet := scattered(3, 40, "A3")
	draw := func() []byte { return Compose(sheet, sampled(sheet, 0, 3), Options{Meshes: true}).AppendSVG(nil) }
	if !bytes.Equal(draw(), draw()) {
		t.Error("two drawings of one sheet differ")
	}
}

func TestACaseWithoutASolutionNamesItsPartsAndShowsNoNumbers(t *testing.T) {
	sheet := decoded(t, quarrel)
	root := drawnCase(t, sheet, solved(t, sheet), 0)
	ids := map[string]bool{}
	for _, e := range root.all("id") {
		ids[e.attributes["id"]] = true
	}
	for id, want := range map[string]bool{
		"problem-G1": true, "problem-G2": true, "problem-R1": false, "loose-36-6": true, "loose-38-12": true, "join-20-6": true, "join-8-6": false,
	} {
		if ids[id] != want {
			t.Errorf("%s is there: %v", id, ids[id])
		}
	}
	if len(root.all("data-voltage"))+len(root.all("data-current")) > 0 {
		t.Error("numbers are shown")
	}
}
