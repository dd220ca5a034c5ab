package draw

import (
	"math"
	"strconv"
	"testing"

	"golang.org/x/image/font"
	"golang.org/x/image/font/opentype"

	"loopwright/schematic"
	"loopwright/schematic/stroke"
	"loopwright/static"
)

// Trimmed sizes, drawing spaces and numbers of fields (long side, short side) after ISO 5457:1999 with its amendment of
// 2010, as summarised in courses on technical drawing.
func TestTheFrameHasTheFieldsOfISO5457(t *testing.T) {
	for size, want := range map[string]struct{ width, height, spaceWidth, spaceHeight, long, short int }{
		"A4": {297, 210, 267, 190, 6, 4}, "A3": {420, 297, 390, 277, 8, 6},
		"A2": {594, 420, 564, 400, 12, 8}, "A1": {841, 594, 811, 574, 16, 12},
	} {
		p := paperOf(size)
		space := p.space()
		center := onPaper(p.width/2, p.height/2)
		if p.width != float64(want.width) || p.height != float64(want.height) {
			t.Errorf("%s is %g mm by %g mm", size, p.width, p.height)
		}
		if wide, high := (space.Right-space.Left)*stroke.Step, (space.Bottom-space.Top)*stroke.Step; math.Abs(wide-float64(want.spaceWidth)) > 1e-9 || math.Abs(high-float64(want.spaceHeight)) > 1e-9 {
			t.Errorf("%s: the drawing space is %g mm by %g mm", size, wide, high)
		}
		long, short := len(fieldBounds(space.Left, space.Right, center.X))-1, len(fieldBounds(space.Top, space.Bottom, center.Y))-1
		if long != want.long || short != want.short {
			t.Errorf("%s has %d by %d fields", size, long, short)
		}
	}
}

// Sizes of ANSI/ASME Y14.1 in inches.
func TestTheInchSizesAreThoseOfY141(t *testing.T) {
	for size, want := range map[string][2]float64{"A": {11, 8.5}, "B": {17, 11}, "C": {22, 17}, "D": {34, 22}} {
		if p := paperOf(size); math.Abs(p.width-25.4*want[0]) > 1e-9 || math.Abs(p.height-25.4*want[1]) > 1e-9 || !p.inch {
			t.Errorf("%s is %g mm by %g mm", size, p.width, p.height)
		}
	}
}

func TestEverySizeOfSheetHasItsPaper(t *testing.T) {
	seen := map[paper]string{}
	for _, size := range schematic.Sizes() {
		p := paperOf(size)
		if other, taken := seen[p]; taken {
			t.Errorf("%s has the paper of %s", size, other)
		}
		seen[p] = size
		if title, space := p.titleBox(), p.space(); title.Around(space) != space {
			t.Errorf("%s: the title block leaves the frame", size)
		}
	}
}

func TestTheTitleBlockHoldsWhatFits(t *testing.T) {
	sheet := decoded(t, pump)
	sheet.Title = "Irrigation pump with standby set, dosing, level control and remote stop for the whole of the northern glasshouse"
	result := solved(t, sheet)
	picture := Compose(sheet, result, Options{Case: 1, Date: "2026-12-01", Checked: "third drawer", Revision: "B"})
	for _, group := range picture.Groups {
		if group.ID != "title-block" {
			continue
		}
		box := paperOf(sheet.Size).titleBox()
		texts := map[string]bool{}
		for _, shape := range group.List {
			if text, ok := shape.(stroke.Text); ok {
				texts[text.Text] = true
				if textBox(text).Around(box) != box {
					t.Errorf("%q leaves the title block", text.Text)
				}
			}
		}
		for _, want := range []string{"HL-1002", "Harrow Lane Glasshouses", "B", "2026-12-01", "third drawer", "A4", "1 / 1", "Start held", "Shown operated: case"} {
			if !texts[want] {
				t.Errorf("%q is missing", want)
			}
		}
	}
}

// The widths are checked against the text layout of golang.org/x/image, without kerning.
func TestTextIsAsWideAsTheTypefaceMakesIt(t *testing.T) {
	for bold, data := range map[bool][]byte{false: static.Regular(), true: static.Bold()} {
		parsed, err := opentype.Parse(data)
		if err != nil {
			t.Fatal(err)
		}
		face, err := opentype.NewFace(parsed, &opentype.FaceOptions{Size: 1000, DPI: 72, Hinting: font.HintingNone})
		if err != nil {
			t.Fatal(err)
		}
		for _, r := range "0123456789ΩµVA∠°²₁−-→↑éžß" {
			advance, ok := face.GlyphAdvance(r)
			if !ok {
				t.Errorf("the typeface has no %q", r)
			}
			if got := width(string(r), bold); math.Abs(got-float64(advance)/64/1000) > 1e-3 {
				t.Errorf("%q is %g em wide, want %g", r, got, float64(advance)/64/1000)
			}
		}
	}
}

func TestTextThatIsTooLongEndsInAnEllipsis(t *testing.T) {
	for _, room := range []float64{0.5, 1, 3, 8, 100} {
		text := fitted("Harrow Lane Glasshouses", room, false)
		if width(text, false) > room && text != "…" {
			t.Errorf("%q does not fit into %g", text, room)
		}
	}
	if got := fitted("Pump", 100, true); got != "Pump" {
		t.Errorf("what fits is changed to %q", got)
	}
}

func TestLengthsAreWrittenToATenthOfAUnit(t *testing.T) {
	for _, v := range []float64{0, 0.04, 0.05, -0.05, 1, 9.96, 12.34, 99.95, 123.45, 999.99, 1234.5, -1234.56, -0.01} {
		got, err := strconv.ParseFloat(string(appendTenths(nil, v)), 64)
		if err != nil || math.Abs(got-v) > 0.0501 {
			t.Errorf("%g is written %s", v, appendTenths(nil, v))
		}
	}
}
