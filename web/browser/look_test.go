package browser

import (
	"context"
	"math"
	"net/http"
	"os"
	"path/filepath"
	"regexp"
	"strconv"
	"strings"
	"testing"

	"github.com/chromedp/chromedp"

	"loopwright/testdata"
)

// screens are the sizes at which every page is looked at: a desk, a tablet, a phone.
var screens = []struct {
	name          string
	width, height int64
	options       []chromedp.EmulateViewportOption
}{
	{"desk", 1440, 900, nil},
	{"tablet", 1024, 768, nil},
	{"phone", 390, 844, []chromedp.EmulateViewportOption{chromedp.EmulateMobile, chromedp.EmulateTouch}},
}

// demoSheets stores the demo sheets and gives their edit keys by name.
func demoSheets(t *testing.T) map[string]string {
	t.Helper()
	needsBrowser(t)
	entries, err := testdata.Demo.ReadDir("demo")
	if err != nil {
		t.Fatal(err)
	}
	keys := map[string]string{}
	for _, entry := range entries {
		data, err := testdata.Demo.ReadFile("demo/" + entry.Name())
		if err != nil {
			t.Fatal(err)
		}
		keys[strings.TrimSuffix(entry.Name(), ".sheet.json")] = newSheet(t, data)
	}
	return keys
}

// axe runs axe-core on a page and fails for everything that it calls serious or critical.
func axe(page *tab) {
	page.Helper()
	script, err := os.ReadFile("../../testdata/axe/axe.min.js")
	if err != nil {
		page.Fatal(err)
	}
	eval[bool](page, string(script)+"; true")
	found := evalPromise[[]string](page, `axe.run(document).then(result => result.violations
		.filter(v => v.impact === 'serious' || v.impact === 'critical')
		.map(v => v.id + ': ' + v.help + ' at ' + v.nodes.slice(0, 3).map(n => n.target.join(' ')).join(', ')))`)
	for _, violation := range found {
		page.Error("axe: " + violation)
	}
}

func TestPagesAreSoundAtThreeSizes(t *testing.T) {
	keys := demoSheets(t)
	for _, screen := range screens {
		for name, key := range keys {
			t.Run(screen.name+" "+name, func(t *testing.T) {
				page := open(t, "/s/"+key, screen.width, screen.height, screen.options...)
				page.wait(`document.body.dataset.ready === '1'`)
				if wide := eval[int64](page, `document.documentElement.scrollWidth`); wide > screen.width {
					t.Errorf("the page is %d pixels wide on a screen of %d", wide, screen.width)
				}
				axe(page)
			})
		}
	}
	t.Run("start", func(t *testing.T) { axe(open(t, "/", 1440, 900)) })
}

func TestAViewPageIsSoundOnAPhone(t *testing.T) {
	keys := demoSheets(t)
	var shared struct {
		Key string `json:"key"`
	}
	post(t, "/api/v1/sheets/"+keys["two-supplies"]+"/keys", []byte(`{"role":"view","name":"phone"}`), http.StatusCreated, &shared)
	phone := screens[2]
	page := open(t, "/s/"+shared.Key, phone.width, phone.height, phone.options...)
	page.wait(`document.body.dataset.ready === '1'`)
	axe(page)
}

var (
	pdfPage = regexp.MustCompile(`/Type\s*/Page[^s]`)
	pdfBox  = regexp.MustCompile(`/MediaBox\s*\[\s*0 0 ([\d.]+) ([\d.]+)`)
)

func TestASheetPrintsOnOnePageOfItsSize(t *testing.T) {
	keys := demoSheets(t)
	for name, key := range keys {
		t.Run(name, func(t *testing.T) {
			page := openSheet(t, key)
			ctx, cancel := context.WithTimeout(page.ctx, patience)
			defer cancel()
			pdf, err := chromedp.Run(ctx, chromedp.PrintToPDF(chromedp.PDFPreferCSSPageSize(), chromedp.PDFPrintBackground()))
			if err != nil {
				t.Fatal(err)
			}
			if folder := os.Getenv("LOOPWRIGHT_PICTURES"); folder != "" {
				if err := os.WriteFile(filepath.Join(folder, "print-"+name+".pdf"), pdf, 0o644); err != nil {
					t.Fatal(err)
				}
			}
			if pages := len(pdfPage.FindAll(pdf, -1)); pages != 1 {
				t.Errorf("it prints on %d pages", pages)
			}
			box := pdfBox.FindSubmatch(pdf)
			if box == nil {
				t.Fatal("no page size in the PDF")
			}
			// A4 after ISO 216 is 297 × 210 mm; a point is 1/72 inch.
			for i, millimetres := range []float64{297, 210} {
				points, err := strconv.ParseFloat(string(box[i+1]), 64)
				if err != nil || math.Abs(points-millimetres*72/25.4) > 1.5 {
					t.Errorf("side %d of the page is %s points, want %.0f mm", i, box[i+1], millimetres)
				}
			}
		})
	}
}
