package web

import (
	"context"
	"crypto/rand"
	"encoding/hex"
	"log/slog"
	"net/http"
	"runtime/debug"
	"strings"
	"time"

	"github.com/go-chi/chi/v5"
	"github.com/go-chi/chi/v5/middleware"
)

// numberKey is where the context of a request holds its number.
type numberKey struct{}

// requestNumber is what a request is called in the log.
func requestNumber(r *http.Request) string {
	number, _ := r.Context().Value(numberKey{}).(string)
	return number
}

// route is the pattern of the route that a request takes, once it has been found. An address may hold a key, a pattern
// never does.
func route(r *http.Request) string {
	pattern := chi.RouteContext(r.Context()).RoutePattern()
	if pattern == "" || pattern == "/*" {
		return "unmatched"
	}
	return pattern
}

// observe gives each request a number, and logs and counts it once it is answered.
func (s *Server) observe(next http.Handler) http.Handler {
	return http.HandlerFunc(func(w http.ResponseWriter, r *http.Request) {
		var random [8]byte
		rand.Read(random[:]) // never fails
		number := hex.EncodeToString(random[:])
		r = r.WithContext(context.WithValue(r.Context(), numberKey{}, number))
		answer := middleware.NewWrapResponseWriter(w, r.ProtoMajor)
		start := time.Now()
		next.ServeHTTP(answer, r)
		status := max(answer.Status(), http.StatusOK)
		pattern := route(r)
		s.meters.count(method(r), pattern, status)
		level := slog.LevelInfo
		if strings.HasPrefix(pattern, "/static") || strings.HasSuffix(pattern, "z") {
			level = slog.LevelDebug
		}
		s.log.Log(r.Context(), level, "request", slog.String("method", method(r)), slog.String("route", pattern),
			slog.Int("status", status), slog.Int("bytes", answer.BytesWritten()),
			slog.Duration("took", time.Since(start)), slog.String("request", number))
	})
}

// method is the method of a request; what is none of the usual ones is not repeated.
func method(r *http.Request) string {
	switch r.Method {
	case http.MethodGet, http.MethodHead, http.MethodPost, http.MethodPut, http.MethodPatch, http.MethodDelete, http.MethodOptions:
		return r.Method
	}
	return "other"
}

// recoverer answers status 500 when a handler panics, and logs where.
func (s *Server) recoverer(next http.Handler) http.Handler {
	return http.HandlerFunc(func(w http.ResponseWriter, r *http.Request) {
		defer func() {
			switch cause := recover(); cause {
			case nil:
			case http.ErrAbortHandler:
				panic(cause)
			default:
				s.log.Error("panic", slog.String("route", route(r)), slog.String("request", requestNumber(r)),
					slog.Any("cause", cause), slog.String("stack", string(debug.Stack())))
				s.refuse(w, r, &problem{status: http.StatusInternalServerError,
					message: "The server could not do this. If it happens again, report request " + requestNumber(r) + "."})
			}
		}()
		next.ServeHTTP(w, r)
	})
}
