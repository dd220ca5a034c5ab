package browser

import (
	"context"
	"encoding/json"
	"fmt"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"github.com/chromedp/cdproto/cdp"
	"github.com/chromedp/cdproto/input"
	"github.com/chromedp/cdproto/log"
	"github.com/chromedp/cdproto/network"
	"github.com/chromedp/cdproto/runtime"
	"github.com/chromedp/chromedp"
	"github.com/chromedp/chromedp/kb"
)

// open shows a path in a browser context of its own. When the test ends, an error in the console or a request to
// another origin fails it.
func open(t *testing.T, path string, width, height int64, options ...chromedp.EmulateViewportOption) *tab {
	t.Helper()
	needsBrowser(t)
	ctx, cancel := chromedp.NewContext(shared.browser, chromedp.WithNewBrowserContext())
	page := &tab{T: t, ctx: ctx}
	t.Cleanup(func() {
		page.keepPicture()
		cancel()
		page.mu.Lock()
		defer page.mu.Unlock()
		for _, line := range page.trouble {
			t.Error(line)
		}
	})
	// The tab lives as long as the context in which it is first used, so that one must not be a patient one.
	if err := chromedp.Do(ctx); err != nil {
		t.Fatal(err)
	}
	page.do(chromedp.EmulateViewport(width, height, options...))
	if err := chromedp.Listen(ctx, page.hear); err != nil {
		t.Fatal(err)
	}
	for _, start := range []chromedp.Action[chromedp.Void]{
		call(runtime.Enable, cdp.Empty{}), call(log.Enable, cdp.Empty{}), call(network.Enable, network.EnableParams{}),
	} {
		page.do(start)
	}
	page.do(chromedp.Navigate(shared.address + path))
	return page
}

// openSheet shows a sheet on a desk's screen and waits until it can be drawn on.
func openSheet(t *testing.T, key string) *tab {
	t.Helper()
	page := open(t, "/s/"+key, 1440, 900)
	page.wait(`document.body.dataset.ready === '1'`)
	return page
}

func call[P, R any](command cdp.Command[P, R], params P) chromedp.Action[chromedp.Void] {
	return chromedp.Func(func(ctx context.Context, target *chromedp.Target) error {
		_, err := cdp.Call(ctx, target, command, params)
		return err
	})
}

// hear notes errors of the console and requests that leave the server's origin.
func (p *tab) hear(event any) {
	var line string
	switch e := event.(type) {
	case *runtime.EventExceptionThrown:
		line = "uncaught: " + e.ExceptionDetails.Text
		if e.ExceptionDetails.Exception != nil {
			line += " " + e.ExceptionDetails.Exception.Description
		}
	case *runtime.EventConsoleAPICalled:
		if e.Type == "error" || e.Type == "warning" {
			line = "console " + string(e.Type)
			for _, argument := range e.Args {
				line += fmt.Sprintf(" %s%s", argument.Value, argument.Description)
			}
		}
	case *log.EventEntryAdded:
		if e.Entry.Level == "error" {
			line = "log: " + e.Entry.Text + " " + e.Entry.URL
		}
	case *network.EventRequestWillBeSent:
		address := e.Request.URL
		if !strings.HasPrefix(address, shared.address) && !strings.HasPrefix(address, "data:") && !strings.HasPrefix(address, "about:") {
			line = "request to another origin: " + address
		}
	}
	if line != "" {
		p.mu.Lock()
		p.trouble = append(p.trouble, line)
		p.mu.Unlock()
	}
}

// expectRefusal drops the console's notes of a refused request, which Chromium always writes.
func (p *tab) expectRefusal() { p.forgive("status of 4") }

// expectOffline drops the console's notes of requests that found no network.
func (p *tab) expectOffline() {
	p.forgive("ERR_INTERNET_DISCONNECTED")
	p.forgive("Failed to fetch")
}

// forgive drops the notes that hold a text.
func (p *tab) forgive(text string) {
	p.mu.Lock()
	defer p.mu.Unlock()
	p.trouble = slices.DeleteFunc(p.trouble, func(line string) bool { return strings.Contains(line, text) })
}

func (p *tab) do(steps ...chromedp.Action[chromedp.Void]) {
	p.Helper()
	ctx, cancel := context.WithTimeout(p.ctx, patience)
	defer cancel()
	if err := chromedp.Do(ctx, steps...); err != nil {
		p.Fatal(err)
	}
}

// read evaluates an expression in the page.
func eval[T any](p *tab, expression string) T {
	p.Helper()
	ctx, cancel := context.WithTimeout(p.ctx, patience)
	defer cancel()
	value, err := chromedp.Run(ctx, chromedp.Evaluate[T](expression))
	if err != nil {
		p.Fatalf("%s: %v", expression, err)
	}
	return value
}

// wait lets the page go on until a condition holds.
func (p *tab) wait(condition string) {
	p.Helper()
	ctx, cancel := context.WithTimeout(p.ctx, patience)
	defer cancel()
	_, err := chromedp.Run(ctx, chromedp.Poll[bool]("!!("+condition+")", chromedp.WithPollingTimeout(patience)))
	if err != nil {
		p.Fatalf("waiting for %s: %v; the page says %q", condition, err, eval[string](p, `document.getElementById('notice')?.textContent ?? ''`))
	}
}

// settle waits until every edit of the page is answered.
func (p *tab) settle() {
	p.Helper()
	p.wait(`document.body.dataset.pending === '0' && document.body.dataset.state === 'saved'`)
}

type place struct{ X, Y float64 }

// grid is where a grid place is in the window.
func (p *tab) grid(x, y float64) place {
	p.Helper()
	return eval[place](p, fmt.Sprintf(`(() => {
		const sheet = document.getElementById('sheet'), step = Number(sheet.dataset.step);
		const [ox, oy] = sheet.dataset.origin.split(' ').map(Number);
		const at = new DOMPoint(ox + %v * step, oy + %v * step).matrixTransform(sheet.getScreenCTM());
		return {X: at.x, Y: at.y};
	})()`, x, y))
}

// middle is the middle of the first element that a selector finds.
func (p *tab) middle(selector string) place {
	p.Helper()
	return eval[place](p, fmt.Sprintf(`(() => {
		const box = document.querySelector(%s).getBoundingClientRect();
		return {X: box.left + box.width / 2, Y: box.top + box.height / 2};
	})()`, quoted(selector)))
}

func quoted(text string) string {
	data, _ := json.Marshal(text)
	return string(data)
}

func (p *tab) mouse(kind input.DispatchMouseEventType, at place, button input.MouseButton, held, clicks int64) {
	p.Helper()
	p.do(call(input.DispatchMouseEvent, input.DispatchMouseEventParams{Type: kind, X: at.X, Y: at.Y, Button: button, Buttons: held, ClickCount: clicks}))
}

// drag presses at one place and releases at another, with a few moves between.
func (p *tab) drag(from, to place) {
	p.Helper()
	const steps = 6
	p.mouse(chromedp.MouseMoved, from, input.MouseButtonNone, 0, 0)
	p.mouse(chromedp.MousePressed, from, input.MouseButtonLeft, 1, 1)
	for i := 1; i <= steps; i++ {
		part := float64(i) / steps
		p.mouse(chromedp.MouseMoved, place{from.X + (to.X-from.X)*part, from.Y + (to.Y-from.Y)*part}, input.MouseButtonLeft, 1, 0)
	}
	p.mouse(chromedp.MouseReleased, to, input.MouseButtonLeft, 0, 1)
}

// click presses and releases at a place.
func (p *tab) click(at place) {
	p.Helper()
	p.mouse(chromedp.MouseMoved, at, input.MouseButtonNone, 0, 0)
	p.mouse(chromedp.MousePressed, at, input.MouseButtonLeft, 1, 1)
	p.mouse(chromedp.MouseReleased, at, input.MouseButtonLeft, 0, 1)
}

// keys types keys one after the other.
func (p *tab) keys(keys string, options ...chromedp.KeyOption) {
	p.Helper()
	p.do(chromedp.KeyEvent(keys, options...))
}

func (p *tab) control(key string) { p.Helper(); p.keys(key, chromedp.KeyModifiers(kb.ModifierCtrl)) }

// number reads a data attribute as a number.
func (p *tab) number(selector, attribute string) float64 {
	p.Helper()
	return eval[float64](p, fmt.Sprintf(`Number(document.querySelector(%s).getAttribute(%s))`, quoted(selector), quoted(attribute)))
}

// keepPicture writes a screenshot into the folder that LOOPWRIGHT_PICTURES names, for people to look at.
func (p *tab) keepPicture() {
	folder := os.Getenv("LOOPWRIGHT_PICTURES")
	if folder == "" {
		return
	}
	ctx, cancel := context.WithTimeout(p.ctx, patience)
	defer cancel()
	picture, err := chromedp.Run(ctx, chromedp.CaptureScreenshot())
	if err != nil {
		p.Log("no picture:", err)
		return
	}
	name := strings.NewReplacer("/", "-", " ", "-").Replace(p.Name()) + ".png"
	if err := os.WriteFile(filepath.Join(folder, name), picture, 0o644); err != nil {
		p.Log("no picture:", err)
	}
}

// evalPromise evaluates an expression that gives a promise, and waits for its value.
func evalPromise[T any](p *tab, expression string) T {
	p.Helper()
	ctx, cancel := context.WithTimeout(p.ctx, patience)
	defer cancel()
	value, err := chromedp.Run(ctx, chromedp.Evaluate[T](expression, func(params *runtime.EvaluateParams) { params.AwaitPromise = new(true) }))
	if err != nil {
		p.Fatalf("%s: %v", expression, err)
	}
	return value
}
