package web

import (
	"net/http"
	"strings"

	"github.com/go-chi/chi/v5"
	"github.com/go-chi/chi/v5/middleware"

	"loopwright/static"
)

// mostBody is how large the body of a request may be, in bytes.
const mostBody = 4 << 20

// routes lists everything that the server answers to. The order of what wraps it: the log sees all, also what goes wrong
// further in; headers are set before anything can refuse.
func (s *Server) routes() chi.Router {
	r := chi.NewRouter()
	r.Use(s.observe, s.recoverer, headers, s.crossOrigin, middleware.RequestSize(mostBody), middleware.GetHead)
	r.NotFound(s.notFound)
	r.MethodNotAllowed(s.methodNotAllowed(r))

	// A stream of events must not pass through anything that holds it back.
	r.Get("/api/v1/sheets/{key}/events", s.api(s.streamEvents))
	// These are compressed already.
	r.Handle("/static/*", static.Handler())

	r.Group(func(r chi.Router) {
		r.Use(middleware.Compress(5))
		r.Get("/healthz", s.api(s.showAlive))
		r.Get("/readyz", s.api(s.showReady))
		r.Get("/favicon.ico", s.sendToIcon)
		s.programRoutes(r)
		s.downloadRoutes(r)
		s.pageRoutes(r)
	})
	return r
}

// programRoutes are the interface for programs.
func (s *Server) programRoutes(r chi.Router) {
	r.Post("/api/v1/solve", s.api(s.solveBody))
	r.Post("/api/v1/sheets", s.api(s.createSheet))
	r.Get("/api/v1/sheets/{key}", s.api(s.showSheet))
	r.Post("/api/v1/sheets/{key}/edits", s.api(s.editSheet))
	r.Get("/api/v1/sheets/{key}/solution", s.api(s.showSolution))
	r.Post("/api/v1/sheets/{key}/keys", s.api(s.createKey))
	r.Delete("/api/v1/sheets/{key}/keys/{name}", s.api(s.revokeKey))
}

// downloadRoutes are the files that a sheet can be had as.
func (s *Server) downloadRoutes(r chi.Router) {
	r.Get("/s/{key}/sheet.json", s.api(s.sendSheetFile))
	r.Get("/s/{key}/readings.csv", s.api(s.sendReadings))
	r.Get("/s/{key}/drawing.svg", s.api(s.sendDrawing))
}

// headers sets what every answer carries. Where a key stands in the address or in the answer, nothing may keep a copy
// and no search engine may list it.
func headers(next http.Handler) http.Handler {
	const policy = "default-src 'self'; script-src 'self'; style-src 'self'; img-src 'self' data:; font-src 'self'; " +
		"connect-src 'self'; object-src 'none'; base-uri 'none'; frame-ancestors 'none'; form-action 'self'"
	return http.HandlerFunc(func(w http.ResponseWriter, r *http.Request) {
		h := w.Header()
		h.Set("Content-Security-Policy", policy)
		h.Set("X-Content-Type-Options", "nosniff")
		h.Set("Referrer-Policy", "same-origin")
		h.Set("Cross-Origin-Opener-Policy", "same-origin")
		h.Set("Cross-Origin-Resource-Policy", "same-origin")
		if strings.HasPrefix(r.URL.Path, "/s/") || strings.HasPrefix(r.URL.Path, "/api/") {
			h.Set("Cache-Control", "no-store")
			h.Set("X-Robots-Tag", "noindex")
		}
		next.ServeHTTP(w, r)
	})
}

// crossOrigin refuses what the page of another site asks a browser to send.
func (s *Server) crossOrigin(next http.Handler) http.Handler {
	protection := http.NewCrossOriginProtection()
	protection.SetDenyHandler(http.HandlerFunc(func(w http.ResponseWriter, r *http.Request) {
		s.refuse(w, r, &problem{status: http.StatusForbidden, message: "This was sent by a page of another site, and is not taken."})
	}))
	return protection.Handler(next)
}

func (s *Server) sendToIcon(w http.ResponseWriter, r *http.Request) {
	http.Redirect(w, r, static.Path("icon/favicon.svg"), http.StatusFound)
}

func (s *Server) notFound(w http.ResponseWriter, r *http.Request) {
	s.refuse(w, r, &problem{status: http.StatusNotFound, message: "There is nothing at this address."})
}

// methodNotAllowed says with which methods the address can be used.
func (s *Server) methodNotAllowed(routes chi.Routes) http.HandlerFunc {
	return func(w http.ResponseWriter, r *http.Request) {
		for method, answered := range map[string]string{"GET": "GET, HEAD", "POST": "POST", "DELETE": "DELETE"} {
			if routes.Match(chi.NewRouteContext(), method, r.URL.Path) {
				w.Header().Add("Allow", answered)
			}
		}
		s.refuse(w, r, &problem{status: http.StatusMethodNotAllowed, message: "This address does not take " + r.Method + " requests."})
	}
}
