package web

import (
	"context"
	"net/http"
	"net/url"
	"slices"

	"github.com/go-chi/chi/v5"

	"loopwright/web/store"
)

// access gives what a key opens, or store.ErrNotFound.
func (s *Server) access(ctx context.Context, key string) (store.Access, error) {
	return s.store.Access(ctx, key)
}

// opened gives what the key in the address of a request opens. When roles are named, it is store.ErrNotAllowed unless
// the key has one of them.
func (s *Server) opened(r *http.Request, roles ...store.Role) (store.Access, error) {
	access, err := s.access(r.Context(), parameter(r, "key"))
	if err == nil && len(roles) > 0 && !slices.Contains(roles, access.Role) {
		err = store.ErrNotAllowed
	}
	return access, err
}

// parameter gives a part of the address by its name in the pattern of the route, as it was before it was escaped.
func parameter(r *http.Request, name string) string {
	value := chi.URLParam(r, name)
	if r.URL.RawPath == "" {
		return value
	}
	plain, err := url.PathUnescape(value)
	if err != nil {
		return value
	}
	return plain
}
