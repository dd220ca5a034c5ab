package trace_test

import (
	"fmt"
	"testing"

	"loopwright/schematic"
	"loopwright/schematic/kinds"
	"loopwright/schematic/sheettest"
	"loopwright/schematic/trace"
)

func BenchmarkTraceOf200Parts(b *testing.B) {
	sheet := sheettest.Grid(11, 10)
	b.Logf("%d parts", len(sheet.Parts))
	for b.Loop() {
		trace.Trace(sheet)
	}
}

func BenchmarkTraceOf20000Parts(b *testing.B) {
	sheet := sheettest.Grid(101, 100)
	b.Logf("%d parts", len(sheet.Parts))
	for b.Loop() {
		trace.Trace(sheet)
	}
}

func BenchmarkJoinOf200Parts(b *testing.B) {
	sheet := sheettest.Grid(11, 10)
	for b.Loop() {
		schematic.Join(sheet)
	}
}

func BenchmarkTraceOf2500Rungs(b *testing.B) {
	sheet := sheettest.Rungs(2500)
	for b.Loop() {
		trace.Trace(sheet)
	}
}

func BenchmarkTraceOfTangle(b *testing.B) {
	sheet := sheettest.Tangle(1666, 500)
	for b.Loop() {
		trace.Trace(sheet)
	}
}

// A second 0V at the far corner of a grid takes one loop that is not drawn.
func BenchmarkTraceOfGridWithTwoNames(b *testing.B) {
	sheet := sheettest.Grid(51, 50)
	for _, at := range []schematic.Point{{X: 0, Y: 0}, {X: 300, Y: 294}} {
		sheet.Parts = append(sheet.Parts, schematic.Part{Ref: fmt.Sprint("V", at.X), Kind: kinds.Potential, At: at})
	}
	for b.Loop() {
		trace.Trace(sheet)
	}
}
