package web

import (
	"io"
	"net/http"
)

// showAlive answers GET /healthz: the program runs.
func (s *Server) showAlive(w http.ResponseWriter, _ *http.Request) error {
	sendOK(w)
	return nil
}

// showReady answers GET /readyz: the database can be read and written.
func (s *Server) showReady(w http.ResponseWriter, r *http.Request) error {
	if err := s.store.Ready(r.Context()); err != nil {
		s.log.Error("not ready", "error", err)
		return &problem{status: http.StatusServiceUnavailable, message: "The database does not answer."}
	}
	sendOK(w)
	return nil
}

func sendOK(w http.ResponseWriter) {
	w.Header().Set("Content-Type", "text/plain; charset=utf-8")
	w.Header().Set("Cache-Control", "no-store")
	io.WriteString(w, "ok\n")
}
