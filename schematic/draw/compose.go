package draw

import (
	"cmp"
	"slices"

	"loopwright/schematic"
	"loopwright/schematic/cases"
	"loopwright/schematic/kinds"
	"loopwright/schematic/stroke"
	"loopwright/schematic/trace"
)

// Compose lays a sheet out with the solution of one of its cases. The result must be that of the sheet. It is pure, and
// the same input gives the same picture.
func Compose(sheet *schematic.Sheet, result *cases.Result, options Options) *Picture {
	paper := paperOf(sheet.Size)
	solved := &result.Cases[options.Case]
	l := newLayout(sheet, result.Drawing, solved, paper)
	picture := &Picture{
		Title: sheet.Title, Size: sheet.Size, Width: paper.width, Height: paper.height,
		OriginX: originX, OriginY: originY, Interactive: options.Interactive,
	}
	drawing := result.Drawing
	rooms := l.letter(options.Meshes)
	for _, room := range rooms {
		if room.radius > 0 {
			l.obstacles.add(around(room.center, room.radius))
		}
	}
	marks := numberGroups(nil, drawing, l.obstacles)
	groups := make([]Group, 0, 8+len(l.symbols)+len(sheet.Wires)+len(drawing.Joins.Dots)+len(drawing.Meshes)+len(marks)+len(drawing.Statements))
	if options.Interactive {
		space := paper.space()
		groups = append(groups, Group{ID: "grid", Layer: PaperLayer, Ruling: &space})
	}
	groups = append(groups, paper.frameGroup(), paper.titleGroup(sheet, solved, &options))
	if options.Meshes {
		groups = meshGroups(groups, drawing, rooms, solved, l.scale)
	}
	groups = wireGroups(groups, drawing, options.Interactive)
	groups = joinGroups(groups, drawing.Joins.Dots)
	for i := range l.symbols {
		groups = append(groups, l.partGroup(i, options.Interactive))
	}
	groups = append(groups, marks...)
	groups = looseGroups(groups, drawing.Statements)
	for i := range l.symbols {
		if l.named[l.symbols[i].part.Ref] {
			groups = append(groups, l.symbols[i].problemGroup())
		}
	}
	picture.Groups = groups
	return picture
}

// layout is a drawing on its way: its symbols, what is written at them, and what has been given room so far.
type layout struct {
	drawing   *trace.Drawing
	solved    *cases.Case
	scale     scale
	named     map[string]bool // by a problem
	symbols   []symbol        // in the order of the sheet
	branches  []int           // of each part: index of its first branch, or −1
	readings  []*reading      // of each part; nil when there is none
	letterers []lettered
	obstacles *obstacles
}

// lettered is what is written at one part, and where.
type lettered struct {
	labels    labels
	placement placement
	marks     stroke.List
}

func newLayout(sheet *schematic.Sheet, drawing *trace.Drawing, solved *cases.Case, paper paper) *layout {
	l := &layout{
		drawing: drawing, solved: solved, scale: scaleOf(solved, sheet.System.AC()), named: namedBy(solved),
		symbols: make([]symbol, len(sheet.Parts)), branches: make([]int, len(sheet.Parts)),
		readings: make([]*reading, len(sheet.Parts)), letterers: make([]lettered, len(sheet.Parts)),
	}
	for i := range sheet.Parts {
		part := &sheet.Parts[i]
		position, ok := solved.Positions[part.Ref]
		if !ok {
			position = kinds.Rest
		}
		l.symbols[i] = placed(part, sheet.Symbols, position)
		l.branches[i] = -1
		if l.named[part.Ref] {
			l.symbols[i].body = l.symbols[i].troubled() // so that the lettering stands clear of the mark
		}
	}
	for i := range drawing.Branches {
		if branch := &drawing.Branches[i]; l.branches[branch.Part] < 0 {
			l.branches[branch.Part] = i
		}
	}
	l.read()
	l.block(paper)
	return l
}

// read writes the values of every part of a solved case.
func (l *layout) read() {
	if !l.solved.Solved {
		return
	}
	for i, branch := range l.branches {
		if branch >= 0 {
			r := readingOf(l.symbols[i].part, &l.drawing.Branches[branch], &l.solved.Branches[branch], l.scale)
			l.readings[i] = &r
		}
	}
}

// block puts all that is drawn in the way of lettering.
func (l *layout) block(paper paper) {
	l.obstacles = newObstacles(paper.sheetBox(), 8*len(l.symbols)+2*len(l.drawing.Sheet.Wires)+16)
	o := l.obstacles
	for i := range l.symbols {
		l.symbols[i].block(o)
		if l.named[l.symbols[i].part.Ref] {
			l.symbols[i].blockProblem(o)
		}
	}
	blockWires(l.drawing, o)
	for _, statement := range l.drawing.Statements {
		if statement.At != nil {
			o.add(around(onGrid(*statement.At), looseHalf+0.05))
		}
	}
	o.add(paper.titleBox())
	space, sheet := paper.space(), paper.sheetBox()
	o.add(stroke.Box{Left: sheet.Left, Top: sheet.Top, Right: space.Left, Bottom: sheet.Bottom})
	o.add(stroke.Box{Left: space.Right, Top: sheet.Top, Right: sheet.Right, Bottom: sheet.Bottom})
	o.add(stroke.Box{Left: sheet.Left, Top: sheet.Top, Right: sheet.Right, Bottom: space.Top})
	o.add(stroke.Box{Left: sheet.Left, Top: space.Bottom, Right: sheet.Right, Bottom: sheet.Bottom})
}

// letter places all lettering of parts, and the arrows of the meshes if they are wanted. Where lettering has filled a
// mesh, it is placed again with room kept for the arrow.
func (l *layout) letter(meshes bool) []room {
	for i := range l.symbols {
		l.letterers[i].marks = l.symbols[i].marks(l.obstacles)
		l.letterers[i].labels = l.symbols[i].lettering(l.readings[i])
	}
	drawn := len(l.obstacles.boxes)
	order := l.readingOrder()
	l.placeAll(order)
	if !meshes {
		return nil
	}
	rooms := make([]room, len(l.drawing.Meshes))
	for i := range rooms {
		rooms[i].center = l.drawing.Meshes[i].Center
	}
	if findRooms(rooms, l.drawing, l.obstacles) == 0 {
		return rooms
	}
	l.obstacles.rewind(drawn)
	var kept []int
	for i, room := range rooms {
		if l.drawing.Meshes[i].Drawn && room.radius < wantedArrow {
			kept = append(kept, l.obstacles.add(around(room.center, wantedArrow+arrowClear)))
		}
	}
	l.placeAll(order)
	for _, box := range kept {
		l.obstacles.remove(box)
	}
	findRooms(rooms, l.drawing, l.obstacles)
	return rooms
}

// readingOrder lists the parts from the top, and from the left.
func (l *layout) readingOrder() []int {
	order := make([]int, len(l.symbols))
	for i := range order {
		order[i] = i
	}
	slices.SortStableFunc(order, func(a, b int) int {
		p, q := l.symbols[a].part.At, l.symbols[b].part.At
		return cmp.Or(cmp.Compare(p.Y, q.Y), cmp.Compare(p.X, q.X))
	})
	return order
}

func (l *layout) placeAll(order []int) {
	for _, i := range order {
		l.letterers[i].placement = l.symbols[i].place(&l.letterers[i].labels, l.obstacles)
	}
}

// partGroup draws a part with its lettering.
func (l *layout) partGroup(i int, interactive bool) Group {
	s, written := &l.symbols[i], &l.letterers[i]
	part := s.part
	list := append(s.list, written.marks...)
	if written.placement.leader != nil {
		list = append(list, stroke.Path{Points: written.placement.leader, Style: stroke.Style{Ink: stroke.Grey, Weight: stroke.Fine}})
	}
	for j, b := range written.placement.blocks {
		if b != nil {
			list = b.draw(list, written.placement.spots[j])
		}
	}
	group := Group{ID: "part-" + part.Ref, Layer: PartLayer, List: list}
	group.Attributes = append(make([]Attribute, 0, 8), Attribute{"data-part", part.Ref}, Attribute{"data-kind", part.Kind.Name})
	if r := l.readings[i]; r != nil {
		values := &l.solved.Branches[l.branches[i]]
		if !values.Floating {
			group.Attributes = append(group.Attributes, Attribute{"data-voltage", siNumber(values.Voltage, l.scale.ac)})
		}
		group.Attributes = append(group.Attributes, Attribute{"data-current", siNumber(values.Current, l.scale.ac)})
	}
	if interactive {
		l.makeInteractive(&group, i)
	}
	return group
}
