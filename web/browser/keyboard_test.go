package browser

import (
	"fmt"
	"math"
	"testing"

	"github.com/chromedp/chromedp/kb"
)

// arrows presses an arrow key a number of times.
func (p *tab) arrows(key string, times int) {
	p.Helper()
	for range times {
		p.keys(key)
	}
}

func TestACircuitIsDrawnFromTheKeyboardAlone(t *testing.T) {
	page := openSheet(t, drawable(t))
	place := func(words string, left, down int) {
		t.Helper()
		before := eval[int](page, `document.querySelectorAll('#sheet [data-part]').length`)
		page.keys(kb.Escape)
		page.keys("/")
		page.wait(`document.activeElement.id === 'find'`)
		page.keys(words)
		page.keys(kb.Enter)
		page.wait(fmt.Sprintf(`document.querySelectorAll('#sheet [data-part]').length === %d`, before+1))
		page.settle()
		page.arrows(kb.ArrowRight, left)
		page.settle()
		page.arrows(kb.ArrowDown, down)
		page.settle()
	}
	place("dc supply", 0, 2) // G1 at 12, 12: its pins are at 10 and 14
	place("lamp", 8, 2)      // P1 at 20, 12
	focus := func(part string) {
		t.Helper()
		page.keys(kb.Escape)
		page.keys(kb.Escape)
		eval[bool](page, `document.activeElement.blur(), document.querySelector('[data-part="`+part+`"]').focus({focusVisible: true}), true`)
		page.wait(`document.querySelector('.overlay .ticks')`)
	}
	// W begins a wire at the first pin of the selected part, W again at its second.
	wire := func(part string, pin int) {
		t.Helper()
		before := eval[int](page, `document.querySelectorAll('#sheet [data-wire]').length`)
		focus(part)
		for range pin {
			page.keys("w")
		}
		page.arrows(kb.ArrowRight, 8)
		page.keys(kb.Enter)
		page.wait(fmt.Sprintf(`document.querySelectorAll('#sheet [data-wire]').length === %d`, before+1))
		page.settle()
	}
	wire("G1", 1)
	wire("G1", 2)
	page.wait(`Number(document.querySelector('[data-part="P1"]').dataset.current) !== 0`)
	// 24 V across the 288 Ω of a 24 V 2 W lamp, by Ohm's law.
	near(t, "the lamp's current", math.Abs(page.number(`[data-part="P1"]`, "data-current")), 24.0/288)

	// The value is typed in place, as people write it.
	focus("P1")
	page.keys(kb.Enter)
	page.wait(`document.activeElement === document.querySelector('#inline input')`)
	page.keys("12 V" + kb.Enter)
	page.settle()
	page.wait(`Math.abs(Number(document.querySelector('[data-part="P1"]').dataset.current)) > 0.3`)
	near(t, "the current of a 12 V 2 W lamp at 24 V", math.Abs(page.number(`[data-part="P1"]`, "data-current")), 24.0/72)

	page.control("z")
	page.wait(`Math.abs(Number(document.querySelector('[data-part="P1"]').dataset.current)) < 0.3`)
	page.settle()
	page.keys("r")
	page.settle()
	page.keys(kb.Delete)
	page.wait(`!document.querySelector('[data-part="P1"]')`)
	page.settle()
	page.keys("?")
	page.wait(`document.getElementById('keys').open`)
	page.keys(kb.Escape)
	page.wait(`!document.getElementById('keys').open`)
}

func TestABadValueIsSaidByTheFieldAndTheOldOneStays(t *testing.T) {
	page := openSheet(t, demoSheets(t)["sensor-bridge"])
	before := page.number(`[data-part="R4"]`, "data-voltage")
	page.click(page.middle(`[data-part="R4"] .hit`))
	page.wait(`document.querySelector('#callout [name="resistance"]')`)
	eval[bool](page, `(() => { const field = document.querySelector('#callout [name="resistance"]'); field.focus(); field.select(); return true; })()`)
	page.keys("12 apples" + kb.Tab)
	page.wait(`document.querySelector('#callout .trouble').textContent !== ''`)
	page.settle()
	page.expectRefusal()
	if value := eval[string](page, `document.querySelector('#callout [name="resistance"]').value`); value != "1k12" {
		t.Errorf("the field holds %q, not the old value", value)
	}
	near(t, "the voltage across R4", page.number(`[data-part="R4"]`, "data-voltage"), before)
}

func TestAPartDroppedOnAWireGoesInSeriesAndAMoveTakesItsWiresAlong(t *testing.T) {
	page := openSheet(t, demoSheets(t)["two-supplies"])
	page.drag(page.middle(`[data-tray="ammeter"]`), page.grid(18, 5))
	page.wait(`document.querySelector('[data-part="P1"]')`)
	page.settle()
	near(t, "the current through the new ammeter", math.Abs(page.number(`[data-part="P1"]`, "data-current")), math.Abs(page.number(`[data-part="G1"]`, "data-current")))
	wires := eval[int](page, `document.querySelectorAll('#sheet [data-wire]').length`)
	before := page.number(`[data-part="R1"]`, "data-voltage")
	page.drag(page.middle(`[data-part="R1"] .hit`), page.grid(25, 12))
	page.settle()
	page.wait(`document.querySelector('[data-pin="R1:1"]').getAttribute('cx') !== null`)
	near(t, "the voltage across R1 after the move", page.number(`[data-part="R1"]`, "data-voltage"), before)
	if now := eval[int](page, `document.querySelectorAll('#sheet [data-wire]').length`); now != wires {
		t.Errorf("the move left %d wires of %d", now, wires)
	}
	page.control("z")
	page.settle()
	near(t, "the voltage across R1 after undoing", page.number(`[data-part="R1"]`, "data-voltage"), before)
}

func TestTheCaseStripShowsAnotherCase(t *testing.T) {
	page := openSheet(t, demoSheets(t)["two-supplies"])
	near(t, "G2 in the first case carries", boolean(page.number(`[data-part="G2"]`, "data-current") != 0), 1)
	page.click(page.middle(`[data-case="G2 isolated"]`))
	page.wait(`document.querySelector('[data-case="G2 isolated"]').getAttribute('aria-current') === 'true'`)
	near(t, "the current of G2, isolated", page.number(`[data-part="G2"]`, "data-current"), 0)
	// The load then hangs on G1 alone: 24.2 V over 0.12 + 0.02 + 12 + 0.1 Ω, by Ohm's law.
	near(t, "the current of G1", math.Abs(page.number(`[data-part="G1"]`, "data-current")), 24.2/(0.12+0.02+12+0.1))
}

func boolean(b bool) float64 {
	if b {
		return 1
	}
	return 0
}
