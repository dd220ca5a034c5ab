package browser

import (
	"math"
	"testing"

	"github.com/chromedp/cdproto/network"
)

func TestEditsMadeWhileTheServerIsAwayAreSentWhenItIsBack(t *testing.T) {
	page := openSheet(t, demoSheets(t)["sensor-bridge"])
	offline := func(off bool) {
		conditions := []*network.Conditions{{Offline: off, DownloadThroughput: -1, UploadThroughput: -1}}
		page.do(call(network.EmulateNetworkConditionsByRule, network.EmulateNetworkConditionsByRuleParams{MatchedNetworkConditions: conditions}))
	}
	before := page.number(`[data-part="R4"]`, "data-voltage")
	offline(true)
	page.click(page.middle(`[data-part="R4"] .hit`))
	page.keys("r")
	page.keys("r")
	page.wait(`document.body.dataset.state === 'offline' && document.body.dataset.pending === '2'`)
	offline(false)
	eval[bool](page, `window.dispatchEvent(new Event('online'))`)
	page.settle()
	// Turned twice, each edit once, R4 stands on its head: its voltage is measured the other way round.
	near(t, "the voltage across R4", page.number(`[data-part="R4"]`, "data-voltage"), -before)
	if math.Abs(before) < 1 {
		t.Errorf("the voltage across R4 was %v, too little to tell", before)
	}
	page.expectRefusal()
	page.expectOffline()
}
