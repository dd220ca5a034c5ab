package quantity_test

import (
	"testing"

	"loopwright/schematic/quantity"
)

func BenchmarkAppend(b *testing.B) {
	buffer := make([]byte, 0, 64)
	b.ReportAllocs()
	for b.Loop() {
		quantity.Append(buffer, 0.2441, quantity.Ampere, 4)
	}
}

func BenchmarkFormat(b *testing.B) {
	b.ReportAllocs()
	for b.Loop() {
		quantity.Format(0.2441, quantity.Ampere, 4)
	}
}

func BenchmarkExact(b *testing.B) {
	b.ReportAllocs()
	for b.Loop() {
		quantity.Exact(4700, quantity.Ohm)
	}
}

func BenchmarkParse(b *testing.B) {
	for _, text := range []string{"4k7", "4.7 kΩ", "0.000123456789"} {
		b.Run(text, func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				if _, err := quantity.Parse(text, quantity.Ohm); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}
