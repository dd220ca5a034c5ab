package draw

import (
	"fmt"
	"math/rand/v2"
	"testing"

	"loopwright/schematic"
	"loopwright/schematic/kinds"
)

// scattered is a sheet of random parts that lie at least six steps apart, with random wires between their pins.
func scattered(seed uint64, parts int, size string) *schematic.Sheet {
	random := rand.New(rand.NewPCG(seed, 2))
	sheet := schematic.New("Scattered")
	sheet.Size = size
	sheet.Symbols = []kinds.SymbolSet{kinds.IEC, kinds.ANSI}[random.IntN(2)]
	space := paperOf(size).space()
	columns, rows := int(space.Right-4)/6, int(space.Bottom-9)/6
	kindsThere := kinds.All()
	for i, cell := range random.Perm(columns * rows) {
		if i == parts {
			break
		}
		kind := kindsThere[random.IntN(len(kindsThere))]
		sheet.Parts = append(sheet.Parts, schematic.Part{
			Ref: fmt.Sprintf("%s%d", kind.Letter, i+1), Kind: kind,
			At:     schematic.Point{X: 4 + 6*(cell%columns), Y: 3 + 6*(cell/columns)},
			Turn:   90 * random.IntN(4),
			Flip:   random.IntN(2) == 1,
			Values: kind.Tray[random.IntN(len(kind.Tray))].Values,
		})
	}
	wired := map[[2]schematic.Point]bool{}
	for range parts * 5 / 4 {
		from, to := pinOf(sheet, random), pinOf(sheet, random)
		near := (from.X-to.X)*(from.X-to.X)+(from.Y-to.Y)*(from.Y-to.Y) < 15*15
		if from == to || !near || wired[[2]schematic.Point{from, to}] {
			continue
		}
		wired[[2]schematic.Point{from, to}] = true
		points := []schematic.Point{from, to}
		if from.X != to.X && from.Y != to.Y {
			points = []schematic.Point{from, {X: from.X, Y: to.Y}, to}
		}
		sheet.Wires = append(sheet.Wires, schematic.Wire{ID: fmt.Sprintf("w%d", len(sheet.Wires)+1), Points: points})
	}
	return sheet
}

func pinOf(sheet *schematic.Sheet, random *rand.Rand) schematic.Point {
	part := &sheet.Parts[random.IntN(len(sheet.Parts))]
	return part.Pin(part.Kind.Pins[random.IntN(len(part.Kind.Pins))])
}

// ladders is a sheet of bands, each with two rails and a supply, and rungs of a switch, a resistor and a lamp.
func ladders(parts int) *schematic.Sheet {
	sheet := schematic.New("Ladders")
	sheet.Size = "A1"
	for band := 0; len(sheet.Parts) < parts; band++ {
		addBand(sheet, 3+19*band, min(20, (parts-len(sheet.Parts)+2)/3))
	}
	return sheet
}

func addBand(sheet *schematic.Sheet, top, rungs int) {
	add := func(kind *kinds.Kind, x, y int) {
		sheet.Parts = append(sheet.Parts, schematic.Part{
			Ref: fmt.Sprintf("%s%d", kind.Letter, len(sheet.Parts)+1), Kind: kind, At: schematic.Point{X: x, Y: y}, Values: kind.Tray[0].Values,
		})
	}
	wire := func(coordinates ...int) {
		wire := schematic.Wire{ID: fmt.Sprintf("w%d", len(sheet.Wires)+1)}
		for i := 0; i < len(coordinates); i += 2 {
			wire.Points = append(wire.Points, schematic.Point{X: coordinates[i], Y: coordinates[i+1]})
		}
		sheet.Wires = append(sheet.Wires, wire)
	}
	const left, pitch = 5, 7
	bottom, right := top+16, left+pitch*rungs
	add(kinds.DCSupply, left, top+8)
	wire(left, top+6, left, top, right, top, right, top+1)
	wire(left, top+10, left, bottom, right, bottom, right, bottom-1)
	for x := left + pitch; x <= right; x += pitch {
		add(kinds.Switch, x, top+3)
		add(kinds.Resistor, x, top+8)
		add(kinds.Lamp, x, top+13)
		wire(x, top+5, x, top+6)
		wire(x, top+10, x, top+11)
		if x < right {
			wire(x, top, x, top+1)
			wire(x, bottom-1, x, bottom)
		}
	}
}

func BenchmarkDrawing(b *testing.B) {
	for _, parts := range []int{20, 200, 366} {
		b.Run(fmt.Sprintf("%dParts", parts), func(b *testing.B) {
			sheet := ladders(parts)
			result := sampled(sheet, 0, 1)
			var out []byte
			b.ReportAllocs()
			for b.Loop() {
				out = Compose(sheet, result, Options{Meshes: true, Interactive: true}).AppendSVG(out[:0])
			}
			b.ReportMetric(float64(len(out)), "bytes")
		})
	}
}
