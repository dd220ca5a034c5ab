package cases_test

import (
	"context"
	"encoding/json"
	"testing"

	"loopwright/schematic"
	"loopwright/schematic/cases"
	"loopwright/schematic/sheettest"
)

func benchmark(b *testing.B, sheet *schematic.Sheet) {
	b.ReportAllocs()
	for b.Loop() {
		if _, err := cases.Solve(context.Background(), sheet); err != nil {
			b.Fatal(err)
		}
	}
}

// Ten meshes, with tracing and audit.
func BenchmarkSolveOfTenMeshes(b *testing.B) { benchmark(b, sheettest.Grid(6, 3)) }

// About 200 parts, 90 meshes.
func BenchmarkSolveOf200Parts(b *testing.B) { benchmark(b, sheettest.Grid(11, 10)) }

func BenchmarkSolveOf20000Parts(b *testing.B) { benchmark(b, sheettest.Grid(101, 100)) }

func BenchmarkSolutionFileOf200Parts(b *testing.B) {
	result := solve(b, sheettest.Grid(11, 10))
	b.ReportAllocs()
	for b.Loop() {
		if _, err := json.Marshal(result); err != nil {
			b.Fatal(err)
		}
	}
}
