package draw

import (
	"loopwright/schematic/stroke"
)

// Lettering is placed part by part in reading order. For each part a list of arrangements is tried, the best first, and
// the first that covers nothing is taken. What it covers depends only on what lies near, so that an edit elsewhere
// leaves it where it is.

// gap is the room between a symbol and its lettering, in grid steps.
const gap = 0.36

// beforeNext is the room between the lettering of two parts that stand side by side.
const beforeNext = 0.4

// shifts are how far lettering may slide along its symbol, the nearest first.
var shifts = [...]float64{0, -0.5, 0.5, -1, 1, -1.5, 1.5, -2, 2}

// placement is where the lettering of a part has been put: one block, or two.
type placement struct {
	blocks [2]*block // the second is nil when there is one
	spots  [2]spot
	leader []stroke.Point // from the lettering to the symbol; nil when it stands beside it
}

// one is the placement of a single block.
func one(b *block, at spot) placement {
	return placement{blocks: [2]*block{b}, spots: [2]spot{at}}
}

// free reports whether the placement covers nothing.
func (p *placement) free(o *obstacles) bool {
	for i, b := range p.blocks {
		if b != nil && !o.free(b.box(p.spots[i])) {
			return false
		}
	}
	return true
}

// place finds the places of a part's lettering and puts it in the way of what follows.
func (s *symbol) place(l *labels, o *obstacles) placement {
	p := s.arrange(l, o)
	for i, b := range p.blocks {
		if b != nil {
			box := b.box(p.spots[i])
			box.Left, box.Right = box.Left-beforeNext, box.Right+beforeNext
			o.add(box)
		}
	}
	along(p.leader, 0, func(at stroke.Point) bool {
		o.add(around(at, clearOfLines))
		return true
	})
	return p
}

func (s *symbol) arrange(l *labels, o *obstacles) placement {
	switch {
	case s.part.Label != nil:
		return s.byHand(l, o)
	case len(l.figures.lines) == 0:
		if at, ok := s.firstFree(&l.name, s.sides(), o, nil); ok {
			return one(&l.name, at)
		}
		return s.led(&l.name, o, nil)
	}
	if p, ok := s.together(l, o); ok {
		return p
	}
	sides := s.sides()
	if name, ok := s.firstFree(&l.name, sides, o, nil); ok {
		taken := l.name.box(name)
		if figures, ok := s.firstFree(&l.figures, opposite(sides), o, &taken); ok {
			return placement{blocks: [2]*block{&l.name, &l.figures}, spots: [2]spot{name, figures}}
		}
	}
	return s.led(&l.both, o, nil)
}

// together tries the arrangements of name and figures that belong together.
func (s *symbol) together(l *labels, o *obstacles) (placement, bool) {
	list := upright
	if s.level {
		list = level
	}
	for i, shift := range shifts[:7] {
		for _, a := range list {
			if a.form == stacked && i == 0 && l.both.lines == nil {
				l.both = l.name.over(&l.figures)
			}
			if p := s.arranged(l, a, shift); p.free(o) {
				return p, true
			}
		}
	}
	return placement{}, false
}

// The sides of a symbol.
type side uint8

const (
	left side = iota
	right
	above
	below
)

// arrangement says where name and figures of a part stand: on two sides, side by side on one side, or one over the
// other on one side.
type arrangement struct {
	form        form
	name, other side
}

type form uint8

const (
	split form = iota
	abreast
	stacked
)

// The arrangements of parts whose pins lie one above the other, and side by side, the best first.
var (
	upright = []arrangement{{split, left, right}, {stacked, right, right}, {stacked, left, left}, {split, right, left}}
	level   = []arrangement{
		{split, above, below}, {abreast, above, above}, {stacked, above, above}, {abreast, below, below}, {stacked, below, below},
		{split, below, above},
	}
)

func (s *symbol) arranged(l *labels, a arrangement, shift float64) placement {
	if a.form == stacked {
		return one(&l.both, s.beside(&l.both, a.name, shift))
	}
	name, figures := s.beside(&l.name, a.name, shift), s.beside(&l.figures, a.other, shift)
	if a.form == abreast {
		x := s.middle().X + shift
		name.left, name.anchor = x-gap/2-l.name.width, stroke.End
		figures.left, figures.anchor = x+gap/2, stroke.Start
	}
	return placement{blocks: [2]*block{&l.name, &l.figures}, spots: [2]spot{name, figures}}
}

// beside is the spot of a block at one side of the symbol, slid along it.
func (s *symbol) beside(b *block, where side, shift float64) spot {
	center := s.middle()
	switch where {
	case left:
		return spot{s.body.Left - gap - b.width, center.Y - b.height/2 + shift, stroke.End}
	case right:
		return spot{s.body.Right + gap, center.Y - b.height/2 + shift, stroke.Start}
	case above:
		return spot{center.X - b.width/2 + shift, s.body.Top - gap/2 - b.height, stroke.Middle}
	}
	return spot{center.X - b.width/2 + shift, s.body.Bottom + gap/2, stroke.Middle}
}

// middle is the point that lettering is centred on: the origin of a part with several pins, else the middle of its body.
func (s *symbol) middle() stroke.Point {
	if len(s.part.Kind.Pins) > 1 {
		return s.at
	}
	return stroke.Point{X: (s.body.Left + s.body.Right) / 2, Y: (s.body.Top + s.body.Bottom) / 2}
}

// sides are the sides of the symbol in the order in which its name prefers them. The name of a part with a single pin
// stands where the symbol points.
func (s *symbol) sides() [4]side {
	switch {
	case len(s.part.Kind.Pins) > 1 && s.level:
		return [4]side{above, below, right, left}
	case len(s.part.Kind.Pins) > 1:
		return [4]side{left, right, above, below}
	case s.body.Bottom < s.at.Y:
		return [4]side{above, right, left, below}
	case s.body.Top > s.at.Y:
		return [4]side{below, right, left, above}
	case s.body.Right < s.at.X:
		return [4]side{left, above, below, right}
	}
	return [4]side{right, above, below, left}
}

// opposite swaps each side with the one across, in order of preference.
func opposite(sides [4]side) [4]side { return [4]side{sides[1], sides[0], sides[3], sides[2]} }

// firstFree is the first spot at one of the sides where a block covers neither what is in the way nor a further box. At
// the upper and lower corners it lines up with the symbol rather than being centred on it.
func (s *symbol) firstFree(b *block, sides [4]side, o *obstacles, taken *stroke.Box) (spot, bool) {
	fits := func(at spot) bool {
		box := b.box(at)
		return o.free(box) && (taken == nil || !box.Overlaps(*taken))
	}
	for _, shift := range shifts {
		for _, where := range sides {
			if at := s.beside(b, where, shift); fits(at) {
				return at, true
			}
		}
	}
	for _, where := range [...]side{above, below} {
		top, x := s.beside(b, where, 0).top, s.middle().X
		for _, at := range [...]spot{{x + gap, top, stroke.Start}, {x - gap - b.width, top, stroke.End}} {
			if fits(at) {
				return at, true
			}
		}
	}
	return spot{}, false
}

// byHand puts the name where a person has put it: it begins at that point, or ends there when the point lies to the
// left of the part. The figures find their own place.
func (s *symbol) byHand(l *labels, o *obstacles) placement {
	at := onGrid(*s.part.Label).Add(s.at)
	name := spot{at.X, at.Y - l.name.height/2, stroke.Start}
	if s.part.Label.X < 0 {
		name = spot{at.X - l.name.width, name.top, stroke.End}
	}
	p := one(&l.name, name)
	if len(l.figures.lines) == 0 {
		return p
	}
	taken := l.name.box(name)
	p.blocks[1] = &l.figures
	if figures, ok := s.firstFree(&l.figures, opposite(s.sides()), o, &taken); ok {
		p.spots[1] = figures
		return p
	}
	far := s.led(&l.figures, o, &taken)
	p.spots[1], p.leader = far.spots[0], far.leader
	return p
}
