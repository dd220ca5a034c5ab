package schematic_test

import (
	"testing"

	"loopwright/schematic"
	"loopwright/schematic/sheettest"
)

func BenchmarkJoinOf200Parts(b *testing.B) {
	sheet := sheettest.Grid(11, 10)
	b.ReportAllocs()
	for b.Loop() {
		schematic.Join(sheet)
	}
}

func BenchmarkDecodeOf1000Parts(b *testing.B) { benchmarkDecode(b, 23) }

func BenchmarkDecodeOf5000Parts(b *testing.B) { benchmarkDecode(b, 51) }

// benchmarkDecode reads a square grid of resistors with a number of nodes on each side.
func benchmarkDecode(b *testing.B, side int) {
	sheet := sheettest.Grid(side, side)
	data := schematic.Encode(sheet)
	b.SetBytes(int64(len(data)))
	b.ReportAllocs()
	for b.Loop() {
		if _, err := schematic.Decode(data); err != nil {
			b.Fatal(err)
		}
	}
	b.ReportMetric(float64(len(sheet.Parts)), "parts")
}

func BenchmarkEncodeOf1000Parts(b *testing.B) {
	sheet := sheettest.Grid(23, 23)
	b.ReportAllocs()
	for b.Loop() {
		schematic.Encode(sheet)
	}
}

func BenchmarkMoveOnASheetOf200Parts(b *testing.B) {
	sheet := sheettest.Grid(11, 10)
	edits := []schematic.Edit{{Do: "move", Refs: []string{sheet.Parts[len(sheet.Parts)/2].Ref}, By: schematic.Point{X: 1, Y: 1}}}
	b.ReportAllocs()
	for b.Loop() {
		if _, _, _, err := schematic.Apply(sheet, edits); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkSetOnASheetOf200Parts(b *testing.B) {
	sheet := sheettest.Grid(11, 10)
	edits, err := schematic.DecodeEdits([]byte(`[{"do": "set", "ref": "R50", "values": {"resistance": "4k7"}}]`))
	if err != nil {
		b.Fatal(err)
	}
	b.ReportAllocs()
	for b.Loop() {
		if _, _, _, err := schematic.Apply(sheet, edits); err != nil {
			b.Fatal(err)
		}
	}
}
