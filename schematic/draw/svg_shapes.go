package draw

import (
	"math"

	"loopwright/schematic/stroke"
)

// list writes shapes. Lines of one style that follow one another become one path, texts of one style one group.
func (w *writer) list(list stroke.List) {
	for i := 0; i < len(list); {
		switch s := list[i].(type) {
		case stroke.Text:
			i = w.texts(list, i, s)
		case stroke.Circle:
			w.circle(s)
			i++
		default:
			i = w.lines(list, i)
		}
	}
}

// lines writes the paths and arcs of one style from an index on as one path, and gives the index after them.
func (w *writer) lines(list stroke.List, i int) int {
	first, _ := lineStyle(list[i])
	w.text(`<path d="`)
	for ; i < len(list); i++ {
		if style, ok := lineStyle(list[i]); !ok || style != first {
			break
		}
		switch s := list[i].(type) {
		case stroke.Path:
			w.path(s)
		case stroke.Arc:
			w.arc(s)
		}
	}
	w.text(`"`)
	w.style(first)
	w.text("/>")
	return i
}

// lineStyle is the style of a path or an arc; the second result is false for other shapes.
func lineStyle(shape stroke.Shape) (stroke.Style, bool) {
	switch s := shape.(type) {
	case stroke.Path:
		return s.Style, true
	case stroke.Arc:
		return s.Style, true
	}
	return stroke.Style{}, false
}

// style writes what a shape has other than its layer: black lines of normal weight that enclose nothing.
func (w *writer) style(style stroke.Style) {
	if style.Ink != stroke.Black {
		w.text(` stroke="`)
		w.text(colour(style.Ink))
		w.text(`"`)
	}
	if style.Weight != stroke.Normal {
		w.text(` stroke-width="`)
		w.number(style.Weight.Millimetres() * perMillimetre)
		w.text(`"`)
	}
	if style.Dashed {
		w.text(` stroke-dasharray="5 4"`)
	}
	switch {
	case style.Filled:
		w.text(` fill="`)
		w.text(colour(style.Ink))
		w.text(`"`)
	case style.Opaque:
		w.text(` fill="` + colour(stroke.Paper) + `"`)
	}
}

// path writes the commands of a path.
func (w *writer) path(path stroke.Path) {
	var before stroke.Point
	for i, p := range path.Points {
		switch {
		case i == 0:
			w.text("M")
			w.point(p)
		case p.Y == before.Y:
			w.text("H")
			w.number(w.left + p.X*Unit)
		case p.X == before.X:
			w.text("V")
			w.number(w.top + p.Y*Unit)
		default:
			w.text("L")
			w.point(p)
		}
		before = p
	}
	if path.Closed {
		w.text("Z")
	}
}

func (w *writer) point(p stroke.Point) {
	w.number(w.left + p.X*Unit)
	w.text(" ")
	w.number(w.top + p.Y*Unit)
}

// arc writes the commands of an arc of less than a full turn.
func (w *writer) arc(arc stroke.Arc) {
	w.text("M")
	w.point(onCircle(arc.Center, arc.Radius, arc.Start))
	w.text("A")
	w.units(arc.Radius)
	w.text(" ")
	w.units(arc.Radius)
	w.text(" 0 ")
	w.flag(math.Abs(arc.Sweep) > 180)
	w.text(" ")
	w.flag(arc.Sweep > 0)
	w.text(" ")
	w.point(onCircle(arc.Center, arc.Radius, arc.Start+arc.Sweep))
}

func (w *writer) flag(set bool) {
	if set {
		w.text("1")
	} else {
		w.text("0")
	}
}

// onCircle is the point of a circle at an angle in degrees, clockwise from the right.
func onCircle(center stroke.Point, radius, degrees float64) stroke.Point {
	sin, cos := math.Sincos(degrees * math.Pi / 180)
	return stroke.Point{X: center.X + radius*cos, Y: center.Y + radius*sin}
}

func (w *writer) circle(circle stroke.Circle) {
	w.text(`<circle cx="`)
	w.number(w.left + circle.Center.X*Unit)
	w.text(`" cy="`)
	w.number(w.top + circle.Center.Y*Unit)
	w.text(`" r="`)
	w.units(circle.Radius)
	w.text(`"`)
	w.style(circle.Style)
	w.text("/>")
}

// texts writes the texts from an index on that are set alike, and gives the index after them.
func (w *writer) texts(list stroke.List, i int, first stroke.Text) int {
	end := i + 1
	for end < len(list) {
		next, ok := list[end].(stroke.Text)
		if !ok || !setAlike(first, next) {
			break
		}
		end++
	}
	single := end == i+1
	if !single {
		w.text("<g")
		w.lettering(first)
		w.text(">")
	}
	for ; i < end; i++ {
		text := list[i].(stroke.Text)
		w.text(`<text x="`)
		w.number(w.left + text.At.X*Unit)
		w.text(`" y="`)
		w.number(w.top + baseline(text)*Unit)
		w.text(`"`)
		if single {
			w.lettering(text)
		}
		w.text(">")
		w.escaped(text.Text)
		w.text("</text>")
	}
	if !single {
		w.text("</g>")
	}
	return end
}

func setAlike(a, b stroke.Text) bool {
	return a.Ink == b.Ink && a.Height == b.Height && a.Anchor == b.Anchor && a.Bold == b.Bold && a.Italic == b.Italic
}

// lettering writes how a text is set.
func (w *writer) lettering(text stroke.Text) {
	w.text(` stroke="none" fill="`)
	w.text(colour(text.Ink))
	w.text(`" font-size="`)
	w.units(text.Height)
	w.text(`"`)
	switch text.Anchor {
	case stroke.Middle:
		w.text(` text-anchor="middle"`)
	case stroke.End:
		w.text(` text-anchor="end"`)
	}
	if text.Bold {
		w.text(` font-weight="700"`)
	}
	if text.Italic {
		w.text(` font-style="italic"`)
	}
}
