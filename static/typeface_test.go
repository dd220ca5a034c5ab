package static_test

import (
	"bytes"
	"testing"

	"golang.org/x/image/font"
	"golang.org/x/image/font/sfnt"
	"golang.org/x/image/math/fixed"

	"loopwright/static"
)

// cuts are the two cuts of the typeface.
func cuts() map[string][]byte {
	return map[string][]byte{"regular": static.Regular(), "bold": static.Bold()}
}

func parsed(t *testing.T, data []byte) *sfnt.Font {
	t.Helper()
	typeface, err := sfnt.Parse(data)
	if err != nil {
		t.Fatal(err)
	}
	return typeface
}

// A PDF can hold TrueType outlines as they are. Their files begin with version 1.0 (OpenType specification, "Organization
// of an OpenType font").
func TestTheTypefaceIsTrueType(t *testing.T) {
	for name, data := range cuts() {
		if !bytes.HasPrefix(data, []byte{0, 1, 0, 0}) {
			t.Errorf("%s does not begin as TrueType does", name)
		}
	}
}

// Changed fonts may not keep the names of what they were made from, as their licences say.
func TestTheTypefaceBearsItsOwnName(t *testing.T) {
	for cut, data := range cuts() {
		name, err := parsed(t, data).Name(nil, sfnt.NameIDFamily)
		if err != nil || name != "Loopwright Text" {
			t.Errorf("the family of %s is %q (%v)", cut, name, err)
		}
	}
}

func TestTheTypefaceHasEverySignThatDrawingsNeed(t *testing.T) {
	needed := []rune("Ωµμ°∠→←↑↓↕∞√≤≥≠≈×÷·−–—€πφθΔΣ²³⁻₀₁₂₃₄₅₆₇₈₉½▲△○●✓’“”…∥⊥")
	for _, block := range [][2]rune{{' ', '~'}, {0xa0, 0xff}, {0x100, 0x17f}, {'Α', 'Ρ'}, {'Σ', 'Ω'}, {'α', 'ω'}} {
		for r := block[0]; r <= block[1]; r++ {
			needed = append(needed, r)
		}
	}
	for cut, data := range cuts() {
		typeface, buffer := parsed(t, data), new(sfnt.Buffer)
		for _, r := range needed {
			if glyph, err := typeface.GlyphIndex(buffer, r); err != nil || glyph == 0 {
				t.Errorf("%s has no %q (%U)", cut, r, r)
			}
		}
	}
}

// Columns of numbers stand under each other only so.
func TestAllFiguresAreEquallyWide(t *testing.T) {
	for cut, data := range cuts() {
		typeface, buffer := parsed(t, data), new(sfnt.Buffer)
		em := fixed.Int26_6(typeface.UnitsPerEm()) << 6
		var first fixed.Int26_6
		for r := '0'; r <= '9'; r++ {
			glyph, err := typeface.GlyphIndex(buffer, r)
			if err != nil {
				t.Fatal(err)
			}
			advance, err := typeface.GlyphAdvance(buffer, glyph, em, font.HintingNone)
			if err != nil {
				t.Fatal(err)
			}
			if r == '0' {
				first = advance
			}
			if advance != first || advance == 0 {
				t.Errorf("%s: %q is %v wide, '0' %v", cut, r, advance, first)
			}
		}
	}
}
