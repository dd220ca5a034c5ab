package web

import (
	"bytes"
	"context"
	"encoding/json"
	"io"
	"log/slog"
	"net"
	"net/http"
	"net/http/httptest"
	"path/filepath"
	"strings"
	"sync"
	"testing"

	"github.com/go-chi/chi/v5"

	"loopwright/web/store"
)

// lamp is a sheet of a supply, a switch and a lamp.
const lamp = `{
  "format": "loopwright-sheet/1", "title": "Lamp in the pump house", "number": "HL-0001",
  "system": {"kind": "dc"},
  "parts": [
    {"ref": "G1", "kind": "dc-supply", "at": [4, 10], "values": {"voltage": "24 V"}},
    {"ref": "S1", "kind": "switch", "at": [8, 6], "turn": 90, "values": {"form": "make"}},
    {"ref": "P1", "kind": "lamp", "at": [12, 10], "values": {"voltage": 24, "power": "2 W"}}
  ],
  "wires": [
    {"points": [[4, 8], [4, 6], [6, 6]]}, {"points": [[10, 6], [12, 6], [12, 8]]}, {"points": [[4, 12], [12, 12]]}
  ],
  "cases": [{"name": "Rest"}, {"name": "Light on", "positions": {"S1": "operated"}}]
}`

// site is a server that runs for the time of a test.
type site struct {
	t      testing.TB
	server *Server
	store  *store.Store
	http   *httptest.Server
	log    *lines
}

// lines is what has been logged.
type lines struct {
	mutex  sync.Mutex
	buffer bytes.Buffer
}

func (l *lines) Write(data []byte) (int, error) {
	l.mutex.Lock()
	defer l.mutex.Unlock()
	return l.buffer.Write(data)
}

func (l *lines) String() string {
	l.mutex.Lock()
	defer l.mutex.Unlock()
	return l.buffer.String()
}

// run starts a server with an empty database.
func run(t testing.TB) *site {
	t.Helper()
	sheets, err := store.Open(context.Background(), filepath.Join(t.TempDir(), "sheets.db"))
	if err != nil {
		t.Fatal(err)
	}
	log := &lines{}
	server, err := New(Config{Store: sheets, Log: slog.New(slog.NewTextHandler(log, &slog.HandlerOptions{Level: slog.LevelDebug}))})
	if err != nil {
		t.Fatal(err)
	}
	s := &site{t: t, server: server, store: sheets, http: httptest.NewServer(server), log: log}
	s.http.Config.RegisterOnShutdown(server.end)
	t.Cleanup(func() {
		server.end()
		s.http.Close()
		if err := sheets.Close(); err != nil {
			t.Error(err)
		}
	})
	return s
}

// answer is what the server answered.
type answer struct {
	status int
	header http.Header
	body   string
}

// send asks the server; headers are given as name and value in turn.
func (s *site) send(method, path, body string, headers ...string) answer {
	s.t.Helper()
	request, err := http.NewRequest(method, s.http.URL+path, strings.NewReader(body))
	if err != nil {
		s.t.Fatal(err)
	}
	for i := 0; i < len(headers); i += 2 {
		request.Header.Set(headers[i], headers[i+1])
	}
	response, err := http.DefaultTransport.RoundTrip(request) // follows no redirection
	if err != nil {
		s.t.Fatal(err)
	}
	defer response.Body.Close()
	data, err := io.ReadAll(response.Body)
	if err != nil {
		s.t.Fatal(err)
	}
	return answer{response.StatusCode, response.Header, string(data)}
}

// want sends a request whose answer must have a status, and reads the answer when it is JSON.
func (s *site) want(status int, method, path, body string) map[string]any {
	s.t.Helper()
	got := s.send(method, path, body)
	if got.status != status {
		s.t.Fatalf("%s %s answers %d, want %d: %s", method, path, got.status, status, got.body)
	}
	var value map[string]any
	if strings.HasPrefix(got.header.Get("Content-Type"), "application/json") {
		if err := json.Unmarshal([]byte(got.body), &value); err != nil {
			s.t.Fatalf("%s %s answers what is no JSON: %v", method, path, err)
		}
	}
	return value
}

// create stores a sheet and gives its edit key.
func (s *site) create(sheet string) string {
	s.t.Helper()
	return s.want(201, "POST", "/api/v1/sheets", sheet)["edit_key"].(string)
}

// share makes a key for a role.
func (s *site) share(editKey, role, name string) string {
	s.t.Helper()
	return s.want(201, "POST", "/api/v1/sheets/"+editKey+"/keys", `{"role": "`+role+`", "name": "`+name+`"}`)["key"].(string)
}

// sendRaw sends bytes that no client would, and reads all that comes.
func (s *site) sendRaw(request string) string {
	s.t.Helper()
	connection, err := net.Dial("tcp", s.http.Listener.Addr().String())
	if err != nil {
		s.t.Fatal(err)
	}
	defer connection.Close()
	if _, err := io.WriteString(connection, request); err != nil {
		s.t.Fatal(err)
	}
	data, err := io.ReadAll(connection)
	if err != nil {
		s.t.Fatal(err)
	}
	return string(data)
}

// withRoute puts a request into the context that the router would give it.
func withRoute(r *http.Request) *http.Request {
	return r.WithContext(context.WithValue(r.Context(), chi.RouteCtxKey, chi.NewRouteContext()))
}
