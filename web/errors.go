package web

import (
	"context"
	"errors"
	"fmt"
	"log/slog"
	"net/http"
	"strings"

	"loopwright/schematic"
	"loopwright/web/store"
)

// handler answers a request, or returns an error before it has written anything.
type handler func(w http.ResponseWriter, r *http.Request) error

// problem is an error that says what the request is answered.
type problem struct {
	status   int
	message  string // a sentence for people
	place    string // in what was sent: "parts[3].values.resistance"; may be empty
	revision int    // of the sheet, with a conflict; else 0
}

func (p *problem) Error() string { return p.message }

// sentinels says what the errors of the store are answered.
var sentinels = []struct {
	kind    error
	status  int
	message string
}{
	{store.ErrNotFound, http.StatusNotFound,
		"There is nothing at this address. The link may be incomplete, withdrawn or expired; ask for it again where you have it from."},
	{store.ErrNotAllowed, http.StatusForbidden,
		"This link shows the sheet and does not change it; ask for the edit link where you have it from."},
	{store.ErrNameTaken, http.StatusConflict, "There is a link of that name already; take another name, or withdraw that link first."},
	{store.ErrClosed, http.StatusServiceUnavailable, "The server is about to stop; try again in a moment."},
}

// problemOf says what an error is answered. An error that is nobody's business outside gives status 500.
func problemOf(err error) *problem {
	var known *problem
	var conflict *schematic.ConflictError
	var place *schematic.PlaceError
	var syntax *schematic.SyntaxError
	var tooLarge *http.MaxBytesError
	switch {
	case errors.As(err, &known):
		return known
	case errors.As(err, &conflict):
		return &problem{status: http.StatusConflict, message: conflict.Message}
	case errors.As(err, &syntax):
		return &problem{status: http.StatusBadRequest, message: syntax.Message, place: syntax.Place}
	case errors.As(err, &place):
		return &problem{status: http.StatusUnprocessableEntity, message: place.Message, place: place.Place}
	case errors.As(err, &tooLarge):
		return &problem{status: http.StatusRequestEntityTooLarge,
			message: fmt.Sprintf("This is more than %d MiB, the most that is taken at once.", tooLarge.Limit>>20)}
	}
	for _, sentinel := range sentinels {
		if errors.Is(err, sentinel.kind) {
			return &problem{status: sentinel.status, message: sentinel.message}
		}
	}
	return &problem{status: http.StatusInternalServerError}
}

// api makes a handler whose errors are answered as JSON.
func (s *Server) api(h handler) http.HandlerFunc { return s.handle(h, s.writeProblem) }

// page makes a handler whose errors are answered as a page.
func (s *Server) page(h handler) http.HandlerFunc { return s.handle(h, s.problemPage) }

// handle makes a handler whose errors are written by a function. What is internal is logged and hidden behind the number
// of the request.
func (s *Server) handle(h handler, write func(http.ResponseWriter, *http.Request, *problem)) http.HandlerFunc {
	return func(w http.ResponseWriter, r *http.Request) {
		err := h(w, r)
		if err == nil || errors.Is(err, context.Canceled) && r.Context().Err() != nil {
			return // answered, or nobody is there any more
		}
		p := problemOf(err)
		if p.status == http.StatusInternalServerError {
			number := requestNumber(r)
			s.log.Error("request failed", slog.String("route", route(r)), slog.String("request", number), slog.Any("error", err))
			p.message = "The server could not do this, and nothing was changed. Try again; if that does not help, report request " + number + "."
		}
		write(w, r, p)
	}
}

// refuse answers a problem that arises before any handler: to a browser with a page, to programs with JSON.
func (s *Server) refuse(w http.ResponseWriter, r *http.Request, p *problem) {
	if !strings.HasPrefix(r.URL.Path, "/api/") && strings.Contains(r.Header.Get("Accept"), "text/html") {
		s.problemPage(w, r, p)
		return
	}
	s.writeProblem(w, r, p)
}

// writeProblem answers {"error": {"message", "place"}}, beside it the revision of a conflict.
func (s *Server) writeProblem(w http.ResponseWriter, _ *http.Request, p *problem) {
	type text struct {
		Message string `json:"message"`
		Place   string `json:"place"`
	}
	body := struct {
		Error    text `json:"error"`
		Revision int  `json:"revision,omitzero"`
	}{text{p.message, p.place}, p.revision}
	if p.status == http.StatusServiceUnavailable {
		w.Header().Set("Retry-After", "2")
	}
	if err := writeJSON(w, p.status, body); err != nil {
		s.log.Error("an error could not be written", slog.Any("error", err))
	}
}
