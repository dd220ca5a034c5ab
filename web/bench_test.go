package web

import (
	"fmt"
	"io"
	"net/http"
	"strings"
	"sync"
	"sync/atomic"
	"testing"
)

// BenchmarkEditsOverHTTP measures edits that are answered when durable, each sender on a sheet of its own with 200
// parts. One operation is one edit.
func BenchmarkEditsOverHTTP(b *testing.B) {
	for _, senders := range []int{1, 8} {
		b.Run(fmt.Sprintf("%d senders", senders), func(b *testing.B) {
			s := run(b)
			var keys []string
			for range senders {
				keys = append(keys, s.create(strings.Replace(terminals(200), `"terminal"`, `"resistor"`, -1)))
			}
			client := &http.Client{Transport: &http.Transport{MaxIdleConnsPerHost: senders}}
			var next atomic.Int64
			var wait sync.WaitGroup
			b.ResetTimer()
			for _, key := range keys {
				wait.Go(func() {
					for n := int(next.Add(1)); n <= b.N; n = int(next.Add(1)) {
						edit := fmt.Sprintf(`{"do": "set", "ref": "X%d", "values": {"resistance": %d}}`, n%200, 1+n)
						response, err := client.Post(s.http.URL+"/api/v1/sheets/"+key+"/edits", "application/json", strings.NewReader(edits(n, "", edit)))
						if err != nil {
							b.Error(err)
							return
						}
						io.Copy(io.Discard, response.Body)
						response.Body.Close()
						if response.StatusCode != http.StatusOK {
							b.Errorf("status %d", response.StatusCode)
						}
					}
				})
			}
			wait.Wait()
			b.ReportMetric(float64(b.N)/b.Elapsed().Seconds(), "edits/s")
		})
	}
}
