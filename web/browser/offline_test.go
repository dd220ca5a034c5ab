package browser

import (
	"testing"

	"github.com/chromedp/cdproto/network"
)

func TestEditsMadeWhileTheServerIsAwayAreSentWhenItIsBack(t *testing.T) {
	key := demoSheets(t)["sensor-bridge"]
	page := openSheet(t, key)
	offline := func(off bool) {
		conditions := []*network.Conditions{{Offline: off, DownloadThroughput: -1, UploadThroughput: -1}}
		page.do(call(network.EmulateNetworkConditionsByRule, network.EmulateNetworkConditionsByRuleParams{MatchedNetworkConditions: conditions}))
	}
	offline(true)
	page.click(page.middle(`[data-part="R4"] .hit`))
	page.keys("r")
	page.keys("r")
	page.wait(`document.body.dataset.state === 'offline' && document.body.dataset.pending === '2'`)
	offline(false)
	eval[bool](page, `window.dispatchEvent(new Event('online'))`)
	page.settle()
	var stored struct {
		Sheet struct {
			Parts []struct {
				Ref  string `json:"ref"`
				Turn int    `json:"turn"`
			} `json:"parts"`
		} `json:"sheet"`
		Revision int `json:"revision"`
	}
	get(t, "/api/v1/sheets/"+key, &stored)
	for _, part := range stored.Sheet.Parts {
		if part.Ref == "R4" && part.Turn != 180 {
			t.Errorf("R4 is turned by %d, want 180: each of the two edits once", part.Turn)
		}
	}
	if stored.Revision != 3 {
		t.Errorf("the sheet is at revision %d, want 3", stored.Revision)
	}
	page.expectOffline()
}
