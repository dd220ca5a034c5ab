package trace_test

import (
	"testing"

	"loopwright/schematic"
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
