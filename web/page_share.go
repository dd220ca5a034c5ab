package web

import (
	"errors"
	"net/http"
	"strings"
	"time"

	"loopwright/schematic"
	"loopwright/web/store"
	"loopwright/web/view"
)

// showShare answers GET /s/{key}/share: the panel of addresses under which the sheet can be seen.
func (s *Server) showShare(w http.ResponseWriter, r *http.Request) error {
	if _, err := s.opened(r, store.Edit); err != nil {
		return err
	}
	return s.sendShare(w, r, http.StatusOK, "")
}

// changeShare answers POST /s/{key}/share: makes a view link for `name`, or withdraws the link named `withdraw`.
func (s *Server) changeShare(w http.ResponseWriter, r *http.Request) error {
	if _, err := s.opened(r, store.Edit); err != nil {
		return err
	}
	if err := readForm(r); err != nil {
		return err
	}
	key := parameter(r, "key")
	var err error
	if name := r.PostForm.Get("withdraw"); name != "" {
		err = s.store.Revoke(r.Context(), key, name)
	} else {
		_, err = s.store.Share(r.Context(), key, store.View, strings.TrimSpace(r.PostForm.Get("name")), time.Time{})
	}
	var place *schematic.PlaceError
	switch {
	case err == nil:
		return s.sendShare(w, r, http.StatusOK, "")
	case errors.As(err, &place):
		return s.sendShare(w, r, http.StatusUnprocessableEntity, place.Message)
	case errors.Is(err, store.ErrNameTaken):
		return s.sendShare(w, r, http.StatusConflict, problemOf(err).message)
	}
	return err
}

func (s *Server) sendShare(w http.ResponseWriter, r *http.Request, status int, trouble string) error {
	key := parameter(r, "key")
	keys, err := s.store.Keys(r.Context(), key)
	if err != nil {
		return err
	}
	share := &view.Share{Key: key, Error: trouble}
	for _, k := range keys {
		if !k.Expired {
			share.Links = append(share.Links, view.Link{Name: k.Name, Role: string(k.Role), Address: "/s/" + k.Key})
		}
	}
	return sendPage(w, r, status, view.SharePanel(share))
}
