package web

import (
	"bytes"
	"net/http"

	"github.com/a-h/templ"
	"github.com/go-chi/chi/v5"

	"loopwright/static"
	"loopwright/web/view"
)

// pageRoutes are what people see, and what a page asks for while it is open.
func (s *Server) pageRoutes(r chi.Router) {
	r.Get("/", s.page(s.showStart))
	r.Post("/new", s.page(s.createFromPage))
	r.Get("/s/{key}", s.page(s.showSheetPage))
	r.Post("/s/{key}/edit", s.api(s.editFromPage))
	r.Get("/s/{key}/changes", s.api(s.showChanges))
	r.Get("/s/{key}/card", s.api(s.showCard))
	r.Get("/s/{key}/share", s.api(s.showShare))
	r.Post("/s/{key}/share", s.api(s.changeShare))
}

// pageOf is what every page needs.
func pageOf(title string) view.Page { return view.Page{Title: title, Static: static.Path} }

// problemPage tells a person why there is no page.
func (s *Server) problemPage(w http.ResponseWriter, r *http.Request, p *problem) {
	if err := sendPage(w, r, p.status, view.ErrorPage(pageOf("Loopwright"), p.message)); err != nil {
		http.Error(w, p.message, p.status)
	}
}

// sendPage renders a component whole before it writes anything, so that an error can still be answered as one.
func sendPage(w http.ResponseWriter, r *http.Request, status int, component templ.Component) error {
	var html bytes.Buffer
	if err := component.Render(r.Context(), &html); err != nil {
		return err
	}
	sendHTML(w, status, html.Bytes())
	return nil
}

func sendHTML(w http.ResponseWriter, status int, html []byte) {
	w.Header().Set("Content-Type", "text/html; charset=utf-8")
	w.WriteHeader(status)
	_, _ = w.Write(html) // nobody is left to tell when the browser has gone
}
