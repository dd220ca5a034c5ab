package browser

import (
	"fmt"
	"testing"

	"github.com/chromedp/cdproto/input"
	"github.com/chromedp/chromedp"
	"github.com/chromedp/chromedp/kb"
)

func TestAWireThatEndsOnAWireGetsADotAndACrossingGetsOneOnlyWhenItIsJoined(t *testing.T) {
	needsBrowser(t)
	page := openSheet(t, newSheet(t, []byte(`{"format":"loopwright-sheet/1","title":"Crossing","system":{"kind":"dc"},
		"parts":[{"ref":"R1","kind":"resistor","at":[10,7]},{"ref":"R2","kind":"resistor","at":[20,13],"turn":90}],
		"wires":[{"points":[[4,20],[24,20]]},{"points":[[12,16],[12,24]]}]}`)))
	dots := func() int { return eval[int](page, `document.querySelectorAll('#layer-joins > g').length`) }
	if dots() != 0 {
		t.Errorf("a plain crossing shows %d dots", dots())
	}
	page.drag(page.middle(`[data-pin="R1:2"]`), page.grid(10, 20))
	page.settle()
	if dots() != 1 {
		t.Errorf("after a wire was drawn onto a wire there are %d dots, want 1", dots())
	}
	// The pencil point goes where the pointer was last.
	page.click(page.grid(12, 20))
	page.keys(kb.Escape)
	page.click(page.grid(30, 22))
	page.keys(kb.Escape)
	for range 18 {
		page.keys(kb.ArrowLeft)
	}
	page.keys(kb.ArrowUp)
	page.keys(kb.ArrowUp)
	page.keys("j")
	page.settle()
	if dots() != 2 {
		t.Errorf("after the crossing was joined there are %d dots, want 2", dots())
	}
}

func TestThePaperZoomsAboutThePointerPansAndFits(t *testing.T) {
	page := openSheet(t, demoSheets(t)["two-supplies"])
	width := func() float64 {
		return eval[float64](page, `document.getElementById('paper').getBoundingClientRect().width`)
	}
	fitted := width()
	spot := page.middle(`[data-part="R1"] .hit`)
	for range 4 {
		page.do(call(input.DispatchMouseEvent, input.DispatchMouseEventParams{Type: chromedp.MouseWheel, X: spot.X, Y: spot.Y, DeltaX: 0.01, DeltaY: -120, Modifiers: 2}))
	}
	page.wait(fmt.Sprintf(`document.getElementById('paper').getBoundingClientRect().width > 2 * %v`, fitted))
	// While the paper is smaller than the stage it cannot be scrolled, so that the first step may drift a little.
	zoomed := page.middle(`[data-part="R1"] .hit`)
	if abs(zoomed.X-spot.X) > 15 || abs(zoomed.Y-spot.Y) > 15 {
		t.Errorf("the part under the pointer moved from %v to %v", spot, zoomed)
	}
	page.drag(page.grid(20, 15), place{page.grid(20, 15).X + 100, page.grid(20, 15).Y + 40})
	if now := page.middle(`[data-part="R1"] .hit`); abs(now.X-zoomed.X-100) > 4 || abs(now.Y-zoomed.Y-40) > 4 {
		t.Errorf("panned by 100, 40, the part went from %v to %v", zoomed, now)
	}
	page.keys("0")
	page.wait(fmt.Sprintf(`Math.abs(document.getElementById('paper').getBoundingClientRect().width - %v) < 2`, fitted))
	page.keys("m")
	if eval[string](page, `getComputedStyle(document.getElementById('layer-meshes')).display`) != "none" {
		t.Error("M does not hide the mesh currents")
	}
	page.keys("m")
}

func abs(x float64) float64 { return max(x, -x) }

func TestALoneSwitchIsOperatedByTouchOnAPhone(t *testing.T) {
	key := demoSheets(t)["pump-lamp"]
	phone := screens[2]
	page := open(t, "/s/"+key, phone.width, phone.height, phone.options...)
	page.wait(`document.body.dataset.ready === '1'`)
	at := page.middle(`[data-part="S1"] .hit`)
	touch := func(kind input.DispatchTouchEventType, points []*input.TouchPoint) {
		page.do(call(input.DispatchTouchEvent, input.DispatchTouchEventParams{Type: kind, TouchPoints: points}))
	}
	touch(input.DispatchTouchEventTypeTouchStart, []*input.TouchPoint{{X: at.X, Y: at.Y}})
	touch(input.DispatchTouchEventTypeTouchEnd, []*input.TouchPoint{})
	page.wait(`Number(document.querySelector('[data-part="P1"]').dataset.current) !== 0`)
	page.settle()
}

func TestAWireHasACardWithItsPotentialFromWhichItCanBeRemoved(t *testing.T) {
	page := openSheet(t, demoSheets(t)["two-supplies"])
	page.click(page.grid(23, 7))
	page.wait(`document.querySelector('#callout .computed')`)
	page.click(page.middle(`#callout [data-act="remove"]`))
	page.wait(`document.querySelectorAll('#sheet [data-wire]').length === 6`)
	page.settle()
	page.wait(`document.getElementById('callout').hidden`)
	near(t, "the current through R1, cut off", page.number(`[data-part="R1"]`, "data-current"), 0)
}
