package web

import (
	"fmt"
	"net/http"
	"sync/atomic"

	"github.com/VictoriaMetrics/metrics"
)

// meters counts what the server does, in the text format of Prometheus. Labels hold patterns of routes, never keys.
type meters struct {
	set     *metrics.Set
	edits   *metrics.PrometheusHistogram // seconds until a batch of edits is durable or refused
	solves  *metrics.PrometheusHistogram // seconds that a solution takes
	streams atomic.Int64                 // streams of events that are open
}

func newMeters() *meters {
	bounds := []float64{0.0005, 0.001, 0.002, 0.005, 0.01, 0.02, 0.05, 0.1, 0.2, 0.5, 1, 2, 5, 10}
	set := metrics.NewSet()
	m := &meters{
		set:    set,
		edits:  set.NewPrometheusHistogramExt("loopwright_edit_seconds", bounds),
		solves: set.NewPrometheusHistogramExt("loopwright_solve_seconds", bounds),
	}
	set.NewGauge("loopwright_event_streams", func() float64 { return float64(m.streams.Load()) })
	return m
}

// count counts an answered request.
func (m *meters) count(method, route string, status int) {
	m.set.GetOrCreateCounter(fmt.Sprintf("loopwright_requests_total{method=%q,route=%q,status=\"%d\"}", method, route, status)).Inc()
}

// serveMetrics answers /metrics.
func (s *Server) serveMetrics(w http.ResponseWriter, r *http.Request) {
	if r.URL.Path != "/metrics" {
		http.NotFound(w, r)
		return
	}
	w.Header().Set("Content-Type", "text/plain; version=0.0.4; charset=utf-8")
	s.meters.set.WritePrometheus(w)
	metrics.WriteProcessMetrics(w)
}
