package store

import (
	"context"
	"fmt"
	"path/filepath"
	"sync"
	"sync/atomic"
	"testing"

	"loopwright/schematic"
)

// BenchmarkCommit measures edits that are answered when durable: one operation is one batch of one edit, on sheets of
// 200 parts.
func BenchmarkCommit(b *testing.B) {
	for _, clients := range []int{1, 8, 64} {
		for _, sheets := range []int{1, 8} {
			b.Run(fmt.Sprintf("%d clients on %d sheets", clients, sheets), func(b *testing.B) { commitMany(b, clients, sheets) })
		}
	}
}

func commitMany(b *testing.B, clients, sheets int) {
	s := open(b, filepath.Join(b.TempDir(), "bench.db"))
	var ids []ID
	for range sheets {
		id, _, _, err := s.Create(context.Background(), schematic.New("Pump"))
		if err != nil {
			b.Fatal(err)
		}
		var edits []string
		for n := range 200 {
			edits = append(edits, add(n))
		}
		commit(b, s, id, batch(b, -1, "ann", edits...))
		ids = append(ids, id)
	}
	var next atomic.Int64
	var wait sync.WaitGroup
	for b.ResetTimer(); clients > 0; clients-- {
		wait.Go(func() {
			for n := int(next.Add(1)); n <= b.N; n = int(next.Add(1)) {
				edit := fmt.Sprintf(`{"do": "set", "ref": "R%d", "values": {"resistance": %d}}`, n%200, 1+n)
				commit(b, s, ids[n%sheets], batch(b, n, "ann", edit))
			}
		})
	}
	wait.Wait()
	b.ReportMetric(float64(b.N)/b.Elapsed().Seconds(), "edits/s")
}
