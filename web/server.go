// Package web serves sheets: the pages, the interface for programs, and the events that tell of changes.
//
// Handlers return an error; one adapter turns it into an answer, so that what is said to people is decided in one place
// and nothing internal leaves the server. No log line and no metric holds a key: they name the pattern of a route, never
// an address.
package web

import (
	"context"
	"errors"
	"log/slog"
	"net"
	"net/http"
	"runtime"
	"time"

	"golang.org/x/sync/semaphore"
	"golang.org/x/sync/singleflight"

	"loopwright/web/recent"
	"loopwright/web/store"
)

// Config is what a server needs.
type Config struct {
	Store *store.Store // must be set; the caller closes it after the server has ended
	Log   *slog.Logger // nil: nothing is logged
	// SolveLimit is how long a solution may take; 0 is 10 s.
	SolveLimit time.Duration
	// Now tells the time; nil is time.Now.
	Now func() time.Time
}

// Server answers requests. Make one with New.
type Server struct {
	store      *store.Store
	log        *slog.Logger
	solveLimit time.Duration
	now        func() time.Time
	waitLimit  time.Duration // for a processor to become free
	pingEvery  time.Duration // between signs of life on a stream of events

	router    http.Handler
	meters    *meters
	solutions *recent.Map[solutionKey, *solvedSheet]
	solving   singleflight.Group
	frames    *recent.Map[frameKey, *frame]
	slots     *semaphore.Weighted // one for each solution that may be worked out at the same time
	ending    context.Context
	end       context.CancelFunc
}

// New makes a server.
func New(config Config) (*Server, error) {
	if config.Store == nil {
		return nil, errors.New("the server needs a store")
	}
	s := &Server{
		store:      config.Store,
		log:        config.Log,
		solveLimit: config.SolveLimit,
		now:        config.Now,
		waitLimit:  10 * time.Second,
		pingEvery:  15 * time.Second,
		meters:     newMeters(),
		solutions:  recent.New[solutionKey, *solvedSheet](mostSolved),
		frames:     recent.New[frameKey, *frame](mostFrames),
		slots:      semaphore.NewWeighted(int64(runtime.GOMAXPROCS(0))),
	}
	if s.log == nil {
		s.log = slog.New(slog.DiscardHandler)
	}
	if s.solveLimit == 0 {
		s.solveLimit = 10 * time.Second
	}
	if s.now == nil {
		s.now = time.Now
	}
	s.ending, s.end = context.WithCancel(context.Background())
	s.router = s.routes()
	return s, nil
}

// ServeHTTP answers a request.
func (s *Server) ServeHTTP(w http.ResponseWriter, r *http.Request) { s.router.ServeHTTP(w, r) }

// lastWords is how long requests that are under way may take when the server ends.
const lastWords = 10 * time.Second

// Serve answers requests until the context ends; then it takes no more, ends the streams of events, and returns when
// what was under way has been answered. It closes the listeners. Metrics are served on a listener of their own, which
// may be nil.
func (s *Server) Serve(ctx context.Context, listener, forMetrics net.Listener) error {
	pages := s.httpServer(s)
	pages.RegisterOnShutdown(s.end)
	servers := map[*http.Server]net.Listener{pages: listener}
	if forMetrics != nil {
		servers[s.httpServer(http.HandlerFunc(s.serveMetrics))] = forMetrics
	}
	failed := make(chan error, len(servers))
	for server, listener := range servers {
		go func() { failed <- server.Serve(listener) }()
	}
	var err error
	select {
	case <-ctx.Done():
	case err = <-failed:
	}
	last, cancel := context.WithTimeout(context.WithoutCancel(ctx), lastWords)
	defer cancel()
	for server := range servers {
		if late := server.Shutdown(last); late != nil {
			err = errors.Join(err, late, server.Close())
		}
	}
	return err
}

func (s *Server) httpServer(handler http.Handler) *http.Server {
	return &http.Server{
		Handler:           handler,
		ReadHeaderTimeout: 5 * time.Second,
		ReadTimeout:       30 * time.Second,
		WriteTimeout:      60 * time.Second,
		IdleTimeout:       2 * time.Minute,
		MaxHeaderBytes:    32 << 10,
		ErrorLog:          slog.NewLogLogger(s.log.Handler(), slog.LevelWarn),
	}
}
