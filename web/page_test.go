package web

import (
	"fmt"
	"net/http"
	"net/url"
	"regexp"
	"strings"
	"testing"

	"github.com/PuerkitoBio/goquery"

	"loopwright/schematic"
	"loopwright/schematic/kinds"
	"loopwright/schematic/sheettest"
	"loopwright/testdata"
)

const formType = "application/x-www-form-urlencoded"

// demo is a demo sheet as a file.
func demo(t testing.TB, name string) string {
	t.Helper()
	data, err := testdata.Demo.ReadFile("demo/" + name + ".sheet.json")
	if err != nil {
		t.Fatal(err)
	}
	return string(data)
}

// document reads an answer as HTML.
func document(t testing.TB, html string) *goquery.Document {
	t.Helper()
	page, err := goquery.NewDocumentFromReader(strings.NewReader(html))
	if err != nil {
		t.Fatal(err)
	}
	return page
}

// sendEdit sends a batch as a page does.
func (s *site) sendEdit(key string, id, base int, shown, edits string) answer {
	s.t.Helper()
	form := url.Values{"id": {number(id)}, "base": {fmt.Sprint(base)}, "author": {number(7)}, "case": {shown}, "edits": {edits}}
	return s.send("POST", "/s/"+key+"/edit", form.Encode(), "Content-Type", formType)
}

func TestTheStartPageOffersTheExamplesAndTheCautions(t *testing.T) {
	page := document(t, run(t).send("GET", "/", "").body)
	if n := page.Find(".examples form").Length(); n != len(examples) {
		t.Errorf("%d examples, want %d", n, len(examples))
	}
	if text := page.Find(".cautions").Text(); !strings.Contains(text, "isolate") || !strings.Contains(text, "licensed practice") {
		t.Errorf("the cautions say %q", text)
	}
}

func TestANewSheetAndACopyOfAnExampleAreMadeFromTheStartPage(t *testing.T) {
	s := run(t)
	for form, title := range map[string]string{"title=Bench+3&size=A3": "Bench 3", "example=two-supplies": "Valve manifold on two supplies", "title=": "Untitled"} {
		made := s.send("POST", "/new", form, "Content-Type", formType)
		if made.status != http.StatusSeeOther {
			t.Fatalf("%s: status %d: %s", form, made.status, made.body)
		}
		page := document(t, s.send("GET", made.header.Get("Location"), "").body)
		if value, _ := page.Find("#title").Attr("value"); value != title {
			t.Errorf("%s: the sheet is called %q, want %q", form, value, title)
		}
	}
	if refused := s.send("POST", "/new", "size=A9", "Content-Type", formType); refused.status != http.StatusUnprocessableEntity {
		t.Errorf("an unknown size of paper is answered with %d", refused.status)
	}
	if unknown := s.send("POST", "/new", "example=../x", "Content-Type", formType); unknown.status != http.StatusNotFound {
		t.Errorf("an unknown example is answered with %d", unknown.status)
	}
}

func TestThePageOfASheetCarriesItsHooks(t *testing.T) {
	s := run(t)
	key := s.create(demo(t, "two-supplies"))
	page := document(t, s.send("GET", "/s/"+key+"?case=G2+isolated", "").body)
	for selector, want := range map[string]int{
		`#sheet[data-step][data-origin]`: 1, `#sheet [data-part][data-kind]`: 7, `#sheet [data-part][data-voltage][data-current]`: 6,
		`#sheet [data-pin]`: 13, `#sheet [data-wire][data-potential]`: 7, `#sheet [data-mesh][data-current]`: 2, `[data-case]`: 3,
		`[data-case="G2 isolated"][aria-current="true"]`: 1, `body[data-state="saved"]`: 1,
	} {
		if n := page.Find(selector).Length(); n != want {
			t.Errorf("%s: %d, want %d", selector, n, want)
		}
	}
	ids := map[string]bool{}
	page.Find("[id]").Each(func(_ int, element *goquery.Selection) {
		id, _ := element.Attr("id")
		if ids[id] {
			t.Errorf("the id %q is there twice", id)
		}
		ids[id] = true
	})
}

func TestAViewPageHasNothingToEditWith(t *testing.T) {
	s := run(t)
	key := s.create(demo(t, "two-supplies"))
	view := s.share(key, "view", "colleague")
	page := document(t, s.send("GET", "/s/"+view, "").body)
	for _, selector := range []string{"[data-tray]", "#undo", "#open-share", "input#title"} {
		if page.Find(selector).Length() > 0 {
			t.Errorf("the view page has %s", selector)
		}
	}
	if strings.Contains(page.Text(), key) {
		t.Error("the view page holds the edit key")
	}
	if refused := s.sendEdit(view, 1, 1, "", `[{"do":"turn","refs":["R1"]}]`); refused.status != http.StatusForbidden {
		t.Errorf("an edit with the view key is answered with %d", refused.status)
	}
	if refused := s.send("GET", "/s/"+view+"/share", ""); refused.status != http.StatusForbidden {
		t.Errorf("the share panel of a view key is answered with %d", refused.status)
	}
}

var patchID = regexp.MustCompile(`<g id="([^"]+)"`)

func TestAnEditIsAnsweredWithJustWhatChanged(t *testing.T) {
	s := run(t)
	key := s.create(demo(t, "two-supplies"))
	answer := s.sendEdit(key, 1, 1, "Both supplies", `[{"do":"add","part":{"kind":"terminal","at":[30,30]}}]`)
	if answer.status != http.StatusOK {
		t.Fatalf("status %d: %s", answer.status, answer.body)
	}
	ids := patchID.FindAllStringSubmatch(answer.body, -1)
	for _, id := range ids {
		if id[1] != "part-X1" && !strings.HasPrefix(id[1], "pot-") {
			t.Errorf("the patch holds %s, which did not change", id[1])
		}
	}
	if len(ids) == 0 || !strings.Contains(answer.body, `revision="2"`) || strings.Contains(answer.body, "whole") {
		t.Errorf("the patch is %s", answer.body)
	}
	if made := answer.header.Get("Loopwright-Made"); !strings.Contains(made, "X1") {
		t.Errorf("made: %s", made)
	}
	removed := s.sendEdit(key, 2, 2, "Both supplies", `[{"do":"remove","refs":["X1"]}]`)
	if !strings.Contains(removed.body, `gone="part-X1`) {
		t.Errorf("the part that was removed is not said to be gone: %s", removed.body)
	}
}

func TestAPageThatHasLostCountIsSentEverything(t *testing.T) {
	s := run(t)
	key := s.create(demo(t, "two-supplies"))
	for _, since := range []string{"0", "99", "x", "-1"} {
		answer := s.send("GET", "/s/"+key+"/changes?since="+since+"&was=&case=", "")
		if answer.status != http.StatusOK || !strings.Contains(answer.body, `whole=""`) || strings.Count(answer.body, "data-part=") != 7 {
			t.Errorf("since %s: status %d, %d parts", since, answer.status, strings.Count(answer.body, "data-part="))
		}
	}
}

func TestShowingAnotherCaseSendsOnlyWhatDiffers(t *testing.T) {
	s := run(t)
	key := s.create(demo(t, "two-supplies"))
	answer := s.send("GET", "/s/"+key+"/changes?since=1&was=Both+supplies&case=G2+isolated", "")
	if strings.Contains(answer.body, `id="wire-`) || !strings.Contains(answer.body, `id="part-S2"`) || !strings.Contains(answer.body, `id="strip"`) {
		t.Errorf("the patch is %s", answer.body)
	}
}

// A page that takes every patch shows the same as a page that is loaded anew.
func TestPatchesLeadToTheSamePieces(t *testing.T) {
	s := run(t)
	key := s.create(demo(t, "sensor-bridge"))
	access, err := s.store.Access(t.Context(), key)
	if err != nil {
		t.Fatal(err)
	}
	before, err := s.server.frame(t.Context(), access, 1, "")
	if err != nil {
		t.Fatal(err)
	}
	shown := map[string]string{}
	for _, p := range before.groups {
		shown[p.id] = string(p.html)
	}
	for i, edit := range []string{
		`{"do":"move","refs":["P1"],"by":[0,1]}`, `{"do":"set","ref":"R4","values":{"resistance":"2k"}}`, `{"do":"remove","refs":["R2"]}`,
		`{"do":"rename","ref":"R4","to":"R9"}`, `{"do":"undo"}`, `{"do":"turn","refs":["R1"]}`,
	} {
		if answer := s.sendEdit(key, 10+i, before.revision, "", "["+edit+"]"); answer.status != http.StatusOK {
			t.Fatalf("%s: status %d: %s", edit, answer.status, answer.body)
		}
		now, err := s.server.frame(t.Context(), access, before.revision+1, "")
		if err != nil {
			t.Fatal(err)
		}
		for _, id := range missing(before.groups, now.groups) {
			delete(shown, id)
		}
		for _, p := range changed(before.groups, now.groups) {
			shown[p.id] = string(p.html)
		}
		if len(shown) != len(now.groups) {
			t.Fatalf("after %s the page shows %d groups, want %d", edit, len(shown), len(now.groups))
		}
		for _, p := range now.groups {
			if shown[p.id] != string(p.html) {
				t.Fatalf("after %s the group %s is another", edit, p.id)
			}
		}
		before = now
	}
}

func TestTheCardShowsValuesReadingsAndLimits(t *testing.T) {
	s := run(t)
	key := s.create(demo(t, "two-supplies"))
	card := document(t, s.send("GET", "/s/"+key+"/card?ref=R1&case=Both+supplies", "").body)
	if value, _ := card.Find(`[name="resistance"]`).Attr("value"); value != "12 Ω" {
		t.Errorf("resistance %q", value)
	}
	if text := card.Find(".limit").Text(); !strings.Contains(text, "of 60 W") {
		t.Errorf("the limit says %q", text)
	}
	wire := document(t, s.send("GET", "/s/"+key+"/card?wire=w3&case=Both+supplies", "").body)
	// Across the load and the ammeter lie (12 + 0.1) Ω times 1.973 A, by Ohm's law.
	if text := wire.Find(".computed").Text(); !strings.Contains(text, "23.87 V") {
		t.Errorf("the card of the wire above the load says %q", text)
	}
	if answer := s.send("GET", "/s/"+key+"/card?ref=R99", ""); answer.status != http.StatusNotFound {
		t.Errorf("the card of a part that is not there is answered with %d", answer.status)
	}
}

func TestARefusedEditSaysWhyAndChangesNothing(t *testing.T) {
	s := run(t)
	key := s.create(demo(t, "two-supplies"))
	for edit, status := range map[string]int{
		`[{"do":"set","ref":"R1","values":{"resistance":"12 apples"}}]`: 422, `[{"do":"rename","ref":"R1","to":"G1"}]`: 409,
		`[{"do":"move","refs":["R7"],"by":[1,0]}]`: 409, `[{"do":"jump"}]`: 422, `nonsense`: 422, ``: 422,
	} {
		answer := s.sendEdit(key, status+len(edit), 1, "", edit)
		if answer.status != status || !strings.Contains(answer.body, `"message"`) {
			t.Errorf("%s: status %d, want %d: %s", edit, answer.status, status, answer.body)
		}
	}
	if revision := s.want(200, "GET", "/api/v1/sheets/"+key, "")["revision"]; revision != 1.0 {
		t.Errorf("the sheet is at revision %v", revision)
	}
}

// ladder is a control circuit of 200 parts on A1: a supply, and four banks of rungs between rails of one name, each rung
// with a switch, a resistor and a lamp.
func ladder() string {
	sheet := schematic.New("Ladder")
	sheet.Size = "A1"
	const banks, rungs, pitch, height = 4, 16, 9, 26
	part := func(kind *kinds.Kind, ref string, x, y int, values kinds.Values) {
		sheet.Parts = append(sheet.Parts, schematic.Part{Ref: ref, Kind: kind, At: schematic.Point{X: x, Y: y}, Values: values})
	}
	wire := func(points ...schematic.Point) {
		sheet.Wires = append(sheet.Wires, schematic.Wire{ID: fmt.Sprintf("w%d", len(sheet.Wires)+1), Points: points})
	}
	part(kinds.DCSupply, "G1", 4, 12, nil)
	wire(schematic.Point{X: 4, Y: 10}, schematic.Point{X: 4, Y: 2})
	wire(schematic.Point{X: 4, Y: 14}, schematic.Point{X: 4, Y: 24})
	for bank := range banks {
		top, bottom := 2+height*bank, 24+height*bank
		part(kinds.Potential, fmt.Sprintf("V%d", 2*bank+1), 4, top, kinds.Values{"name": kinds.Word(kinds.Text, "L+")})
		part(kinds.Potential, fmt.Sprintf("V%d", 2*bank+2), 4, bottom, nil)
		wire(schematic.Point{X: 4, Y: top}, schematic.Point{X: 4 + pitch*rungs, Y: top})
		wire(schematic.Point{X: 4, Y: bottom}, schematic.Point{X: 4 + pitch*rungs, Y: bottom})
		for i := 1; i <= rungs; i++ {
			x, number := 4+pitch*i, bank*rungs+i
			part(kinds.Switch, fmt.Sprintf("S%d", number), x, top+5, nil)
			part(kinds.Resistor, fmt.Sprintf("R%d", number), x, top+11, nil)
			part(kinds.Lamp, fmt.Sprintf("P%d", number), x, top+17, nil)
			for _, y := range [][2]int{{0, 3}, {7, 9}, {13, 15}, {19, 22}} {
				wire(schematic.Point{X: x, Y: top + y[0]}, schematic.Point{X: x, Y: top + y[1]})
			}
		}
	}
	return string(schematic.Encode(sheet))
}

// lattice is a grid of 10 by 11 nodes with 199 parts, in which every edit changes every value: the worst case.
func lattice() string { return string(schematic.Encode(sheettest.Grid(10, 11))) }

// benchmarkEdits measures edits from the page: posted, durable, solved, drawn, and answered with what changed.
func benchmarkEdits(b *testing.B, sheet string, edit func(i int) string) {
	s := run(b)
	key := s.create(sheet)
	s.send("GET", "/s/"+key+"/changes?since=0&case=Rest", "")
	bytes := 0
	b.ResetTimer()
	for i := range b.N {
		answer := s.sendEdit(key, i, 1+i, "Rest", "["+edit(i)+"]")
		if answer.status != http.StatusOK {
			b.Fatal(answer.body)
		}
		bytes += len(answer.body)
	}
	b.ReportMetric(float64(bytes)/float64(b.N), "bytes/op")
}

func BenchmarkEditToFragmentsOf200Parts(b *testing.B) {
	operate := func(i int) string {
		return fmt.Sprintf(`{"do":"operate","case":"Rest","ref":"S30","position":"%s"}`, []string{"operated", "rest"}[i%2])
	}
	move := func(i int) string { return fmt.Sprintf(`{"do":"move","refs":["R30"],"by":[0,%d]}`, 1-2*(i%2)) }
	b.Run("a switch operated", func(b *testing.B) { benchmarkEdits(b, ladder(), operate) })
	b.Run("a part moved", func(b *testing.B) { benchmarkEdits(b, ladder(), move) })
	b.Run("every value changed", func(b *testing.B) {
		benchmarkEdits(b, lattice(), func(i int) string {
			return fmt.Sprintf(`{"do":"set","ref":"R90","values":{"resistance":%d}}`, 100+i)
		})
	})
}

func BenchmarkPageOf200Parts(b *testing.B) {
	s := run(b)
	key := s.create(ladder())
	for b.Loop() {
		if answer := s.send("GET", "/s/"+key, ""); answer.status != http.StatusOK {
			b.Fatal(answer.body)
		}
	}
}
