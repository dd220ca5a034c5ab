package web

import (
	"net/http"
	"time"

	"loopwright/schematic"
	"loopwright/web/store"
)

// createKey answers POST /api/v1/sheets/{key}/keys: makes a key that shows the sheet.
func (s *Server) createKey(w http.ResponseWriter, r *http.Request) error {
	if _, err := s.opened(r, store.Edit); err != nil {
		return err
	}
	data, err := readBody(r)
	if err != nil {
		return err
	}
	var sent struct {
		Role    store.Role `json:"role"`
		Name    string     `json:"name"`
		Expires *string    `json:"expires"`
	}
	if err := decode(data, &sent); err != nil {
		return err
	}
	var expires time.Time
	if sent.Expires != nil {
		if expires, err = time.Parse(time.RFC3339, *sent.Expires); err != nil {
			return &schematic.PlaceError{Place: "expires",
				Message: `a time in the form of RFC 3339 is needed here, such as "2027-03-31T18:00:00Z"`}
		}
	}
	key, err := s.store.Share(r.Context(), parameter(r, "key"), sent.Role, sent.Name, expires)
	if err != nil {
		return err
	}
	return writeJSON(w, http.StatusCreated, struct {
		Key string `json:"key"`
	}{key})
}

// revokeKey answers DELETE /api/v1/sheets/{key}/keys/{name}: withdraws a key.
func (s *Server) revokeKey(w http.ResponseWriter, r *http.Request) error {
	if err := s.store.Revoke(r.Context(), parameter(r, "key"), parameter(r, "name")); err != nil {
		return err
	}
	w.WriteHeader(http.StatusNoContent)
	return nil
}
