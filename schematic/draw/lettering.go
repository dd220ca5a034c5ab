package draw

import (
	"sync"

	"golang.org/x/image/font"
	"golang.org/x/image/font/sfnt"
	"golang.org/x/image/math/fixed"

	"loopwright/schematic/stroke"
	"loopwright/static"
)

// face knows how wide the characters of one cut of the typeface are, in parts of its em.
type face struct {
	advances [tabled]float32 // by code point
	other    float32         // of all further characters: as wide as those of the widest scripts
}

// tabled is the number of characters whose widths are looked up once; arrows and mathematical signs lie below it.
const tabled = 0x2600

// Heights within a line, in parts of the em of the typeface (DejaVu Sans).
const (
	capHeight = 0.729 // of capitals above the baseline
	lineDepth = 1.2   // from one line to the next
	lineBase  = 0.93  // of the baseline below the top of the line
)

var (
	regularFace = sync.OnceValue(func() *face { return measureFace(static.Regular()) })
	boldFace    = sync.OnceValue(func() *face { return measureFace(static.Bold()) })
)

// measureFace reads the widths of a TrueType font. A font that cannot be read, which tests rule out, is taken to be
// wide, so that the lettering still stays apart.
func measureFace(data []byte) *face {
	f := &face{other: 1}
	for i := range f.advances {
		f.advances[i] = f.other
	}
	parsed, err := sfnt.Parse(data)
	if err != nil {
		return f
	}
	var buffer sfnt.Buffer
	em := fixed.Int26_6(parsed.UnitsPerEm())
	for i := range f.advances {
		index, err := parsed.GlyphIndex(&buffer, rune(i))
		if err != nil || index == 0 {
			continue
		}
		// At a size of as many pixels as the em has units, widths come without rounding.
		if advance, err := parsed.GlyphAdvance(&buffer, index, em<<6, font.HintingNone); err == nil {
			f.advances[i] = float32(advance) / 64 / float32(em)
		}
	}
	return f
}

// width is the width of a line of text in parts of its height, without kerning.
func width(text string, bold bool) float64 {
	f := regularFace()
	if bold {
		f = boldFace()
	}
	var sum float32
	for _, r := range text {
		if r >= 0 && r < tabled {
			sum += f.advances[r]
		} else {
			sum += f.other
		}
	}
	return float64(sum)
}

// baseline is where the baseline of a text lies, in grid steps.
func baseline(text stroke.Text) float64 {
	if text.Centred {
		return text.At.Y + text.Height*capHeight/2
	}
	return text.At.Y
}

// textBox is the box that a text covers, from the top of its line to its bottom.
func textBox(text stroke.Text) stroke.Box {
	wide := width(text.Text, text.Bold) * text.Height
	left := text.At.X
	switch text.Anchor {
	case stroke.Middle:
		left -= wide / 2
	case stroke.End:
		left -= wide
	}
	top := baseline(text) - 0.78*text.Height
	return stroke.Box{Left: left, Top: top, Right: left + wide, Bottom: top + 0.99*text.Height}
}

// fitted shortens a text with an ellipsis until it is no wider than a room, given in parts of its height.
func fitted(text string, room float64, bold bool) string {
	if width(text, bold) <= room {
		return text
	}
	runes := []rune(text)
	for len(runes) > 0 && width(string(runes), bold)+width("…", bold) > room {
		runes = runes[:len(runes)-1]
	}
	return string(runes) + "…"
}
