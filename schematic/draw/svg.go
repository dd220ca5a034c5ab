package draw

import (
	"strconv"
	"unicode/utf8"

	"loopwright/schematic/stroke"
)

// What every layer hands down to its groups, so that they need not say it again.
const (
	lineDefaults = `fill="none" stroke="#16181d" stroke-width="1.4" stroke-linecap="round" stroke-linejoin="round"`
	fontFamily   = `'Loopwright Text','DejaVu Sans',sans-serif`
)

// colour is the ink as it is seen on a screen.
func colour(ink stroke.Ink) string {
	return [...]string{"#16181d", "#1d4f9e", "#b3202c", "#f2d543", "#c9c8bc", "#fdfcf7", "#565b56"}[ink]
}

// AppendSVG appends the whole drawing as one <svg>. It is a file of its own, and goes into a page as it is; what the
// page exchanges are the groups within the layers.
func (p *Picture) AppendSVG(dst []byte) []byte {
	w := writer{out: dst, left: p.OriginX * perMillimetre, top: p.OriginY * perMillimetre}
	width, height := p.Width*perMillimetre, p.Height*perMillimetre
	w.text(`<svg id="sheet" xmlns="http://www.w3.org/2000/svg" viewBox="0 0 `)
	w.number(width)
	w.text(" ")
	w.number(height)
	w.text(`" width="`)
	w.number(p.Width)
	w.text(`mm" height="`)
	w.number(p.Height)
	w.text(`mm" overflow="visible" data-step="20" data-origin="`)
	w.number(w.left)
	w.text(" ")
	w.number(w.top)
	w.text(`" font-family="` + fontFamily + `" aria-label="`)
	w.escaped("Drawing: " + p.Title)
	if p.Interactive {
		w.text(`" role="group" tabindex="-1">`)
	} else {
		w.text(`" role="img"><rect width="`)
		w.number(width)
		w.text(`" height="`)
		w.number(height)
		w.text(`" fill="` + colour(stroke.Paper) + `"/>`)
	}
	next := 0
	for _, layer := range layers {
		w.text(`<g id="layer-`)
		w.text(layer)
		w.text(`" ` + lineDefaults + `>`)
		for ; next < len(p.Groups) && p.Groups[next].Layer == layer; next++ {
			w.group(&p.Groups[next])
		}
		w.text("</g>")
	}
	w.text("</svg>")
	return w.out
}

// AppendSVG appends the group as one <g>, as it stands within its layer.
func (g *Group) AppendSVG(dst []byte) []byte {
	w := writer{out: dst, left: originX * perMillimetre, top: originY * perMillimetre}
	w.group(g)
	return w.out
}

func (w *writer) group(g *Group) {
	w.text(`<g id="`)
	w.escaped(g.ID)
	w.text(`" data-layer="`)
	w.text(g.Layer)
	for _, attribute := range g.Attributes {
		w.text(`" `)
		w.text(attribute.Name)
		w.text(`="`)
		w.escaped(attribute.Value)
	}
	w.text(`">`)
	if g.Ruling != nil {
		w.ruling(*g.Ruling)
	}
	w.list(g.List)
	if g.Along != nil {
		w.text(`<path class="wire-hit" stroke="transparent" stroke-width="12" pointer-events="stroke" d="`)
		w.path(stroke.Path{Points: g.Along})
		w.text(`"/>`)
	}
	if g.Hit != nil {
		w.handles(*g.Hit, g.Handles)
	}
	w.text("</g>")
}

// handles writes what a pointer meets: the part, and over it its pins.
func (w *writer) handles(hit stroke.Box, pins []Handle) {
	w.text(`<g stroke="none" pointer-events="all"><rect class="hit" `)
	w.box(hit)
	w.text(`/>`)
	for _, handle := range pins {
		w.text(`<circle class="pin" r="7" cx="`)
		w.number(w.left + handle.At.X*Unit)
		w.text(`" cy="`)
		w.number(w.top + handle.At.Y*Unit)
		w.text(`" data-pin="`)
		w.escaped(handle.Name)
		w.text(`"/>`)
	}
	w.text("</g>")
}

// ruling fills a box with the dots of the grid.
func (w *writer) ruling(box stroke.Box) {
	w.text(`<defs><pattern id="grid-dots" patternUnits="userSpaceOnUse" width="20" height="20" x="`)
	w.number(w.left - Unit/2)
	w.text(`" y="`)
	w.number(w.top - Unit/2)
	w.text(`"><circle cx="10" cy="10" r="0.8" stroke="none" fill="` + colour(stroke.Faint) + `"/></pattern></defs>`)
	w.text(`<rect class="grid-dots" stroke="none" fill="url(#grid-dots)" `)
	w.box(box)
	w.text(`/>`)
}

// box writes a rectangle's attributes.
func (w *writer) box(box stroke.Box) {
	w.text(`x="`)
	w.number(w.left + box.Left*Unit)
	w.text(`" y="`)
	w.number(w.top + box.Top*Unit)
	w.text(`" width="`)
	w.number((box.Right - box.Left) * Unit)
	w.text(`" height="`)
	w.number((box.Bottom - box.Top) * Unit)
	w.text(`"`)
}

// writer appends SVG. Places are moved by left and top, in user units.
type writer struct {
	out       []byte
	left, top float64
}

func (w *writer) text(s string) { w.out = append(w.out, s...) }

// number writes a length in user units, to a twentieth of a unit or better.
func (w *writer) number(v float64) { w.out = appendTenths(w.out, v) }

// units writes a length that is given in grid steps.
func (w *writer) units(steps float64) { w.number(steps * Unit) }

// appendTenths appends a number rounded to one decimal, without a trailing zero.
func appendTenths(dst []byte, v float64) []byte {
	scaled := v * 10
	if scaled < 0 {
		scaled -= 0.5
	} else {
		scaled += 0.5
	}
	tenths := int64(scaled)
	if tenths < 0 {
		dst, tenths = append(dst, '-'), -tenths
	}
	whole, rest := tenths/10, byte(tenths%10)
	switch {
	case whole < 10:
		dst = append(dst, byte('0'+whole))
	case whole < 100:
		dst = append(dst, byte('0'+whole/10), byte('0'+whole%10))
	case whole < 1000:
		dst = append(dst, byte('0'+whole/100), byte('0'+whole/10%10), byte('0'+whole%10))
	default:
		dst = strconv.AppendInt(dst, whole, 10)
	}
	if rest != 0 {
		dst = append(dst, '.', '0'+rest)
	}
	return dst
}

// escaped appends text for use in an element or an attribute. Characters that XML 1.0 cannot hold are left out.
func (w *writer) escaped(s string) {
	for i := 0; i < len(s); i++ {
		if c := s[i]; c < ' ' || c == '&' || c == '<' || c == '>' || c == '"' || c == '\'' || c >= 0xED {
			w.text(s[:i])
			w.escapeRunes(s[i:])
			return
		}
	}
	w.text(s)
}

func (w *writer) escapeRunes(s string) {
	for _, r := range s {
		switch {
		case r == '&':
			w.text("&amp;")
		case r == '<':
			w.text("&lt;")
		case r == '>':
			w.text("&gt;")
		case r == '"':
			w.text("&quot;")
		case r == '\'':
			w.text("&#39;")
		case !invalid(r):
			w.out = utf8.AppendRune(w.out, r)
		}
	}
}

// invalid reports whether XML 1.0 has no place for the character (section 2.2 of the recommendation). Broken UTF-8 is
// read as U+FFFD, which is valid.
func invalid(r rune) bool {
	return r < 0x20 && r != '\t' && r != '\n' && r != '\r' || r == 0xFFFE || r == 0xFFFF
}
