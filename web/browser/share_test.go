package browser

import (
	"net/http"
	"strings"
	"testing"
)

func TestALinkIsMadeInTheSharePanelAndWithdrawnThere(t *testing.T) {
	page := openSheet(t, demoSheets(t)["pump-lamp"])
	page.click(page.middle("#open-share"))
	page.wait(`document.getElementById('share').open`)
	eval[bool](page, `document.querySelector('#share [name="name"]').focus(), true`)
	page.keys("Inspector")
	page.click(page.middle(`#share [data-share] button`))
	page.wait(`document.querySelector('#share [data-copy]')`)
	address := eval[string](page, `document.querySelector('#share [data-copy]').value`)
	path, own := strings.CutPrefix(address, shared.address)
	if !own {
		t.Fatalf("the link is %q, not on this server", address)
	}
	viewer := open(t, path, 1440, 900)
	viewer.wait(`document.body.dataset.ready === '1'`)
	if role := eval[string](viewer, `document.body.dataset.role`); role != "view" {
		t.Errorf("the link opens the sheet with the role %q", role)
	}

	page.click(page.middle(`#share [data-withdraw]`))
	page.wait(`!document.querySelector('#share [data-copy]')`)
	answer, err := http.Get(address)
	if err != nil {
		t.Fatal(err)
	}
	defer answer.Body.Close()
	if answer.StatusCode != http.StatusNotFound {
		t.Errorf("the withdrawn link is answered with status %d", answer.StatusCode)
	}
}

func TestAnImpossibleCircuitIsNamedInTheMarginAndOnTheDrawing(t *testing.T) {
	needsBrowser(t)
	page := openSheet(t, newSheet(t, []byte(`{"format":"loopwright-sheet/1","title":"Two sources at odds","system":{"kind":"dc"},
		"parts":[{"ref":"G1","kind":"voltage-source","at":[8,12],"values":{"voltage":24}},{"ref":"G2","kind":"voltage-source","at":[20,12],"values":{"voltage":12}}],
		"wires":[{"points":[[8,10],[20,10]]},{"points":[[8,14],[20,14]]}]}`)))
	page.wait(`document.querySelector('[data-finding="source-loop"][data-level="stop"]')`)
	says := eval[string](page, `document.querySelector('[data-finding="source-loop"]').textContent`)
	for _, want := range []string{"-G1", "-G2", "12.00 V"} {
		if !strings.Contains(says, want) {
			t.Errorf("the finding says %q, without %q", says, want)
		}
	}
	if marks := eval[int](page, `document.querySelectorAll('#layer-marks > g').length`); marks < 2 {
		t.Errorf("%d marks on the drawing, want one at each part", marks)
	}
	if eval[bool](page, `document.querySelector('[data-part="G1"]').hasAttribute('data-voltage')`) {
		t.Error("a case without a solution shows a voltage")
	}
}

func TestTextsCannotBreakOutOfThePage(t *testing.T) {
	needsBrowser(t)
	page := openSheet(t, newSheet(t, []byte(`{"format":"loopwright-sheet/1","title":"<script>document.body.dataset.broken=1</script>\"'&","owner":"</svg><b>","system":{"kind":"dc"},
		"parts":[{"ref":"V1","kind":"potential","at":[8,12],"values":{"name":"<img src=x onerror=alert(1)>"}}],
		"cases":[{"name":"\"><script>document.body.dataset.broken=2</script>"}]}`)))
	if eval[bool](page, `'broken' in document.body.dataset || document.querySelector('img, b') !== null`) {
		t.Error("a text of the sheet became part of the page")
	}
}
