package draw

import (
	"strconv"

	"loopwright/schematic/stroke"
)

// Where grid point (0, 0) lies on every paper, in millimetres from the upper left corner.
const (
	originX = 25.0
	originY = 15.0
)

// The frame after ISO 5457:1999: a filing border of 20 mm at the left and 10 mm at the other sides, fields of 50 mm that
// are counted from the centring marks, letters without I and O. From memory: the widths of the lines, the centring
// marks of 10 mm and the height of the letters of 3.5 mm. An A4 sheet may carry the fields on two sides only; here all
// four are drawn, as on the larger sizes. The inch sizes of ASME Y14.1 have the same frame, and their fields are counted
// from the lower right corner, as that standard does (from memory).
const (
	filingBorder = 20.0
	border       = 10.0
	strip        = 5.0 // the width of the strip with the letters, outside the frame
	field        = 50.0
	fieldLetters = "ABCDEFGHJKLMNPQRSTUVWXYZ"
)

// paper is a size of drawing paper, lying.
type paper struct {
	width, height float64 // in millimetres
	inch          bool
}

// paperOf is the paper of a size that a sheet may have: ISO 216 for A4 to A1, ASME Y14.1 for A to D.
func paperOf(size string) paper {
	switch size {
	case "A3":
		return paper{420, 297, false}
	case "A2":
		return paper{594, 420, false}
	case "A1":
		return paper{841, 594, false}
	case "A":
		return paper{279.4, 215.9, true}
	case "B":
		return paper{431.8, 279.4, true}
	case "C":
		return paper{558.8, 431.8, true}
	case "D":
		return paper{863.6, 558.8, true}
	}
	return paper{297, 210, false}
}

// onPaper turns millimetres from the corner of the paper into grid steps.
func onPaper(x, y float64) stroke.Point {
	return stroke.Point{X: (x - originX) / stroke.Step, Y: (y - originY) / stroke.Step}
}

// space is the inside of the frame, in grid steps.
func (p paper) space() stroke.Box {
	from, to := onPaper(filingBorder, border), onPaper(p.width-border, p.height-border)
	return stroke.Box{Left: from.X, Top: from.Y, Right: to.X, Bottom: to.Y}
}

// sheetBox is the whole paper, in grid steps.
func (p paper) sheetBox() stroke.Box {
	from, to := onPaper(0, 0), onPaper(p.width, p.height)
	return stroke.Box{Left: from.X, Top: from.Y, Right: to.X, Bottom: to.Y}
}

// frameGroup draws the frame with its fields and centring marks.
func (p paper) frameGroup() Group {
	box := p.space()
	rim := box.Grown(strip / stroke.Step)
	frame := stroke.Rectangle(box.Left, box.Top, box.Right, box.Bottom)
	frame.Weight = stroke.Heavy
	list := stroke.List{frame, fine(stroke.Rectangle(rim.Left, rim.Top, rim.Right, rim.Bottom))}
	center := onPaper(p.width/2, p.height/2)
	list = append(list, p.ticks(box, rim, center)...)
	list = append(list, centring(box, center)...)
	list = append(list, p.letters(box, center)...)
	return Group{ID: "frame", Layer: PaperLayer, List: list}
}

// fieldBounds are the borders between fields along one side, ends included. What is left over at an end of less than a
// quarter of a field goes with its neighbour, which gives the numbers of fields of ISO 5457.
func fieldBounds(from, to, center float64) []float64 {
	const step, least = field / stroke.Step, field / stroke.Step / 4
	at := center
	for at-step > from+least {
		at -= step
	}
	list := []float64{from}
	for ; at < to-least; at += step {
		list = append(list, at)
	}
	return append(list, to)
}

func (p paper) ticks(box, rim stroke.Box, center stroke.Point) stroke.List {
	var list stroke.List
	tick := func(x1, y1, x2, y2 float64) {
		list = append(list, fine(stroke.Line(x1, y1, x2, y2)))
	}
	inner := func(bounds []float64) []float64 { return bounds[1 : len(bounds)-1] }
	for _, x := range inner(fieldBounds(box.Left, box.Right, center.X)) {
		tick(x, rim.Top, x, box.Top)
		tick(x, box.Bottom, x, rim.Bottom)
	}
	for _, y := range inner(fieldBounds(box.Top, box.Bottom, center.Y)) {
		tick(rim.Left, y, box.Left, y)
		tick(box.Right, y, rim.Right, y)
	}
	return list
}

// centring draws the four marks at the ends of the axes of the paper; they reach 5 mm to either side of the frame.
func centring(box stroke.Box, center stroke.Point) stroke.List {
	const reach = strip / stroke.Step
	var list stroke.List
	for _, mark := range []stroke.Path{
		stroke.Line(center.X, box.Top-reach, center.X, box.Top+reach),
		stroke.Line(center.X, box.Bottom-reach, center.X, box.Bottom+reach),
		stroke.Line(box.Left-reach, center.Y, box.Left+reach, center.Y),
		stroke.Line(box.Right-reach, center.Y, box.Right+reach, center.Y),
	} {
		mark.Weight = stroke.Heavy
		list = append(list, mark)
	}
	return list
}

func (p paper) letters(box stroke.Box, center stroke.Point) stroke.List {
	const middle = strip / stroke.Step / 2
	var list stroke.List
	letter := func(x, y float64, text string) {
		list = append(list, stroke.Text{
			At: stroke.Point{X: x, Y: y}, Text: text, Height: 0.6, Anchor: stroke.Middle, Centred: true, Ink: stroke.Grey,
		})
	}
	across := fieldBounds(box.Left, box.Right, center.X)
	for i := range across[1:] {
		name := strconv.Itoa(p.counted(i, len(across)-1) + 1)
		x := (across[i] + across[i+1]) / 2
		letter(x, box.Top-middle, name)
		letter(x, box.Bottom+middle, name)
	}
	down := fieldBounds(box.Top, box.Bottom, center.Y)
	for i := range down[1:] {
		at := p.counted(i, len(down)-1)
		y := (down[i] + down[i+1]) / 2
		letter(box.Left-middle, y, fieldLetters[at:at+1])
		letter(box.Right+middle, y, fieldLetters[at:at+1])
	}
	return list
}

// counted is the number of the field at an index, from zero.
func (p paper) counted(i, fields int) int {
	if p.inch {
		return fields - 1 - i
	}
	return i
}
