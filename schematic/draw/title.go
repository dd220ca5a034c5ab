package draw

import (
	"loopwright/schematic"
	"loopwright/schematic/cases"
	"loopwright/schematic/stroke"
	"loopwright/solver"
)

// The title block at the lower right has the data fields of ISO 7200:2004. That standard gives it 180 mm (from memory);
// on the smallest sizes it ends at the middle of the paper, so that the drawing keeps its room.
const (
	titleWidth  = 180.0
	titleHeight = 30.0
)

// titleBox is where the title block lies, in grid steps.
func (p paper) titleBox() stroke.Box {
	space := p.space()
	wide := min(titleWidth, p.width/2-border)
	return stroke.Box{
		Left: space.Right - wide/stroke.Step, Top: space.Bottom - titleHeight/stroke.Step,
		Right: space.Right, Bottom: space.Bottom,
	}
}

// cell is one field of the title block; a row's cells share its width in parts.
type cell struct {
	part        float64
	label, text string
	bold        bool
	ink         stroke.Ink
}

// titleGroup draws the title block.
func (p paper) titleGroup(sheet *schematic.Sheet, solved *cases.Case, options *Options) Group {
	box := p.titleBox()
	back := stroke.Rectangle(box.Left, box.Top, box.Right, box.Bottom)
	back.Opaque, back.Weight = true, stroke.Medium
	list := stroke.List{back}
	top := box.Top
	for _, row := range titleRows(sheet, solved, options) {
		bottom := top + row.height/stroke.Step
		if top > box.Top {
			list = append(list, fine(stroke.Line(box.Left, top, box.Right, top)))
		}
		list = append(list, row.drawn(stroke.Box{Left: box.Left, Top: top, Right: box.Right, Bottom: bottom})...)
		top = bottom
	}
	return Group{ID: "title-block", Layer: PaperLayer, List: list}
}

// titleRow is a row of the title block; its height is in millimetres.
type titleRow struct {
	height float64
	cells  []cell
}

func titleRows(sheet *schematic.Sheet, solved *cases.Case, options *Options) []titleRow {
	revision := options.Revision
	if revision == "" {
		revision = "draft"
	}
	shown := "Case shown"
	if options.Case > 0 {
		shown = "Shown operated: case"
	}
	return []titleRow{
		{9.5, []cell{{part: 0.72, label: "Title", text: sheet.Title, bold: true}, {part: 0.28, label: "Number", text: sheet.Number, bold: true}}},
		{7.75, []cell{
			{part: 0.42, label: "Owner", text: sheet.Owner}, {part: 0.2, label: "Drawn", text: dash(sheet.Author)},
			{part: 0.2, label: "Checked", text: dash(options.Checked)}, {part: 0.18, label: "Date", text: dash(options.Date)},
		}},
		{7.75, []cell{
			{part: 0.62, label: shown, text: solved.Name}, {part: 0.14, label: "Issue", text: revision},
			{part: 0.11, label: "Size", text: sheet.Size}, {part: 0.13, label: "Sheet", text: "1 / 1"},
		}},
		{5, []cell{audited(solved)}},
	}
}

// fine draws a path with the finest line.
func fine(path stroke.Path) stroke.Path {
	path.Weight = stroke.Fine
	return path
}

// dash stands for what nobody has filled in.
func dash(text string) string {
	if text == "" {
		return "—"
	}
	return text
}

// audited says how far the numbers of the case can be trusted. A case that its audit did not pass is not solved.
func audited(solved *cases.Case) cell {
	switch {
	case solved.Solved:
		return cell{part: 1, text: "Arithmetic checked by two methods; accuracy is that of the values entered.", ink: stroke.Blue}
	case solved.Problem != nil && solved.Problem.Code == string(solver.Empty):
		return cell{part: 1, text: "Nothing to solve yet."}
	}
	return cell{part: 1, text: "▲ This case has no solution; no values are shown."}
}

// drawn sets a row into its box: labels above in small grey letters, texts below, shortened where they do not fit.
func (row titleRow) drawn(box stroke.Box) stroke.List {
	const inset = 0.28
	var lines, labels, texts stroke.List
	left := box.Left
	for i, cell := range row.cells {
		if i > 0 {
			lines = append(lines, fine(stroke.Line(left, box.Top, left, box.Bottom)))
		}
		wide := cell.part * (box.Right - box.Left)
		text := stroke.Text{At: stroke.Point{X: left + inset, Y: box.Bottom - 0.34}, Height: 0.62, Bold: cell.bold, Ink: cell.ink}
		switch {
		case cell.label == "":
			text.Height = 0.5
			text.At.Y = (box.Top + box.Bottom) / 2
			text.Centred = true
		case cell.bold:
			text.Height = 0.82
			text.At.Y = box.Bottom - 0.44
		}
		text.Height, text.Text = setInto(cell.text, text.Height, wide-2*inset, cell.bold)
		texts = append(texts, text)
		if cell.label != "" {
			labels = append(labels, stroke.Text{
				At: stroke.Point{X: left + inset, Y: box.Top + 0.52}, Text: cell.label, Height: 0.42, Ink: stroke.Grey,
			})
		}
		left += wide
	}
	return append(append(lines, labels...), texts...)
}

// setInto makes a text fit a room in grid steps: first by letters down to three quarters of their height, then by an
// ellipsis.
func setInto(text string, height, room float64, bold bool) (float64, string) {
	wide := width(text, bold) * height
	if wide <= room {
		return height, text
	}
	smaller := max(0.75*height, height*room/wide)
	return smaller, fitted(text, room/smaller, bold)
}
