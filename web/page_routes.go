package web

import (
	"net/http"

	"github.com/go-chi/chi/v5"
)

// pageRoutes are what people see.
func (s *Server) pageRoutes(chi.Router) {}

// problemPage tells a person why there is no page.
func (s *Server) problemPage(w http.ResponseWriter, _ *http.Request, p *problem) {
	http.Error(w, p.message, p.status)
}
