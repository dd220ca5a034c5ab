package browser

import (
	"math"
	"net/http"
	"testing"

	"github.com/chromedp/chromedp"
)

// near fails unless two numbers agree to a millionth.
func near(t *testing.T, what string, got, want float64) {
	t.Helper()
	if math.Abs(got-want) > 1e-6*math.Max(1, math.Abs(want)) {
		t.Errorf("%s is %v, want %v", what, got, want)
	}
}

// drawByHand puts a supply, a fuse, a switch and a lamp on the sheet and wires them, with the mouse alone.
func drawByHand(page *tab) {
	page.drag(page.middle(`[data-tray="dc-supply"]`), page.grid(8, 14))
	page.wait(`document.querySelector('[data-part="G1"]')`)
	page.drag(page.middle(`[data-tray="fuse"]`), page.grid(14, 8))
	page.wait(`document.querySelector('[data-part="F1"]')`)
	page.drag(page.middle(`[data-tray="switch"]`), page.grid(24, 10))
	page.wait(`document.querySelector('[data-part="S1"]')`)
	page.drag(page.middle(`[data-tray="lamp"]`), page.grid(24, 18))
	page.wait(`document.querySelector('[data-part="P1"]')`)
	page.settle()
	for _, pair := range [][2]string{{"G1:1", "F1:1"}, {"F1:2", "S1:1"}, {"S1:2", "P1:1"}, {"P1:2", "G1:2"}} {
		before := eval[int](page, `document.querySelectorAll('#sheet [data-wire]').length`)
		page.drag(page.middle(`[data-pin="`+pair[0]+`"]`), page.middle(`[data-pin="`+pair[1]+`"]`))
		page.settle()
		if now := eval[int](page, `document.querySelectorAll('#sheet [data-wire]').length`); now != before+1 {
			page.Fatalf("after drawing from %s to %s there are %d wires, want %d", pair[0], pair[1], now, before+1)
		}
	}
}

// The numbers of the lamp circuit: 24 V, a 24 V 2 W lamp (288 Ω by R = U²/P), a fuse of 0.05 Ω and a contact of 0.02 Ω,
// by Ohm's law.
const lampCurrent = 24 / (288 + 0.05 + 0.02)

func TestACircuitDrawnWithTheMouseIsSolvedSavedAndStillThereAfterAReload(t *testing.T) {
	key := drawable(t)
	page := openSheet(t, key)
	drawByHand(page)

	near(t, "the current through the lamp with the switch open", page.number(`[data-part="P1"]`, "data-current"), 0)
	page.click(page.middle(`[data-part="S1"] .hit`))
	page.settle()
	page.wait(`Number(document.querySelector('[data-part="P1"]').dataset.current) !== 0`)
	for _, shown := range []struct {
		selector, attribute string
		want                float64
	}{
		{`[data-part="P1"]`, "data-current", lampCurrent},
		{`[data-part="P1"]`, "data-voltage", lampCurrent * 288},
		{`[data-part="F1"]`, "data-voltage", lampCurrent * 0.05},
		{`[data-part="S1"]`, "data-voltage", lampCurrent * 0.02},
		{`[data-part="G1"]`, "data-voltage", 24},
	} {
		near(t, shown.selector+" "+shown.attribute, math.Abs(page.number(shown.selector, shown.attribute)), shown.want)
	}
	near(t, "the mesh current", math.Abs(page.number(`#sheet [data-mesh="m1"]`, "data-current")), lampCurrent)
	if text := eval[string](page, `document.querySelector('[data-part="P1"]').textContent`); text == "" {
		t.Error("the lamp has no lettering")
	}

	page.do(chromedp.Reload())
	page.wait(`document.body.dataset.ready === '1'`)
	near(t, "the current after the reload", math.Abs(page.number(`[data-part="P1"]`, "data-current")), lampCurrent)
}

// drawable skips before it asks the server, which runs only beside a browser.
func drawable(t *testing.T) string {
	t.Helper()
	needsBrowser(t)
	return emptySheet(t)
}

func TestAColleagueSeesTheSheetLiveAndCannotChangeIt(t *testing.T) {
	key := drawable(t)
	var shared struct {
		Key string `json:"key"`
	}
	post(t, "/api/v1/sheets/"+key+"/keys", []byte(`{"role":"view","name":"colleague"}`), http.StatusCreated, &shared)
	colleague := openSheet(t, shared.Key)
	editor := openSheet(t, key)

	drawByHand(editor)
	colleague.wait(`document.querySelectorAll('#sheet [data-part]').length === 4 && document.querySelectorAll('#sheet [data-wire]').length === 4`)
	editor.click(editor.middle(`[data-part="S1"] .hit`))
	editor.settle()
	colleague.wait(`Number(document.querySelector('[data-part="P1"]').dataset.current) !== 0`)
	near(t, "the current that the colleague sees", math.Abs(colleague.number(`[data-part="P1"]`, "data-current")), lampCurrent)

	if eval[bool](colleague, `document.querySelector('[data-tray]') !== null`) {
		t.Error("the view page has a tray")
	}
	before := eval[string](colleague, `document.querySelector('[data-part="P1"] .hit').getAttribute('x') + document.body.dataset.revision`)
	colleague.drag(colleague.middle(`[data-part="P1"] .hit`), colleague.grid(34, 20))
	colleague.click(colleague.middle(`[data-part="S1"] .hit`))
	colleague.keys("r")
	var sheet struct {
		Revision int `json:"revision"`
	}
	get(t, "/api/v1/sheets/"+key, &sheet)
	if now := eval[string](colleague, `document.querySelector('[data-part="P1"] .hit').getAttribute('x') + document.body.dataset.revision`); now != before {
		t.Errorf("the colleague's gestures changed the page: %q became %q", before, now)
	}
}
