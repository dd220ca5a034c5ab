package web

import (
	"bufio"
	"context"
	"fmt"
	"net"
	"net/http"
	"strings"
	"testing"
	"time"
)

// listener reads a stream of events.
type listener struct {
	t        *testing.T
	response *http.Response
	lines    *bufio.Scanner
}

// listen opens the stream of events of a key.
func listen(t *testing.T, address, key, last string) *listener {
	t.Helper()
	ctx, cancel := context.WithCancel(context.Background())
	request, err := http.NewRequestWithContext(ctx, "GET", address+"/api/v1/sheets/"+key+"/events", nil)
	if err != nil {
		t.Fatal(err)
	}
	if last != "" {
		request.Header.Set("Last-Event-ID", last)
	}
	response, err := http.DefaultClient.Do(request)
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() {
		cancel()
		response.Body.Close()
	})
	return &listener{t, response, bufio.NewScanner(response.Body)}
}

// next gives the lines of the next event, or "end".
func (l *listener) next() string {
	l.t.Helper()
	var event []string
	for l.lines.Scan() {
		switch line := l.lines.Text(); {
		case line == "" && len(event) > 0:
			return strings.Join(event, "|")
		case line != "" && !strings.HasPrefix(line, ":"):
			event = append(event, line)
		}
	}
	return "end"
}

// want reads the events of revisions.
func (l *listener) want(revisions ...int) {
	l.t.Helper()
	for _, revision := range revisions {
		want := fmt.Sprintf(`id: %d|event: revision|data: {"revision":%d}`, revision, revision)
		if got := l.next(); got != want {
			l.t.Fatalf("the event is %q, want %q", got, want)
		}
	}
}

func TestEveryDurableChangeIsAnEvent(t *testing.T) {
	s := run(t)
	key := s.create(lamp)
	view := s.share(key, "view", "Bench 3")
	first, second := listen(t, s.http.URL, key, ""), listen(t, s.http.URL, view, "")
	first.want(1)
	second.want(1)
	s.want(200, "POST", "/api/v1/sheets/"+key+"/edits", edits(1, "", addResistor))
	first.want(2)
	s.want(409, "POST", "/api/v1/sheets/"+key+"/edits", edits(2, "", `{"do": "remove", "refs": ["K9"]}`))
	s.want(200, "POST", "/api/v1/sheets/"+key+"/edits", edits(1, "", addResistor))
	for n := 3; n <= 20; n++ {
		s.want(200, "POST", "/api/v1/sheets/"+key+"/edits", edits(n, "", addResistor))
	}
	for n := 3; n <= 20; n++ {
		first.want(n)
	}
	for n := 2; n <= 20; n++ {
		second.want(n)
	}
	header := first.response.Header
	if header.Get("Content-Type") != "text/event-stream" || header.Get("Cache-Control") != "no-store" ||
		header.Get("X-Robots-Tag") != "noindex" || header.Get("X-Content-Type-Options") != "nosniff" ||
		header.Get("Content-Encoding") != "" {
		t.Errorf("the stream has the headers %v", header)
	}
}

func TestAReaderWhoComesBackHearsWhatHeMissed(t *testing.T) {
	s := run(t)
	key := s.create(lamp)
	for n := 2; n <= 5; n++ {
		s.want(200, "POST", "/api/v1/sheets/"+key+"/edits", edits(n, "", addResistor))
	}
	listen(t, s.http.URL, key, "3").want(4, 5)
	listen(t, s.http.URL, key, "5").want(5)
	listen(t, s.http.URL, key, "77").want(5)
	listen(t, s.http.URL, key, "many").want(5)
	for n := 6; n <= 5+mostMissed; n++ {
		s.want(200, "POST", "/api/v1/sheets/"+key+"/edits", edits(n, "", addResistor))
	}
	listen(t, s.http.URL, key, "5").want(6, 7)
	listen(t, s.http.URL, key, "4").want(5 + mostMissed)
}

// A stream outlives the time that other requests get, ends with its key, and leaves nothing behind.
func TestAStreamLivesAsLongAsItsKey(t *testing.T) {
	s := run(t)
	s.server.pingEvery = 10 * time.Millisecond
	// Only the stream goes through the impatient server: what else is asked may take longer than its patience.
	impatient := s.server.httpServer(s.server)
	impatient.ReadTimeout, impatient.WriteTimeout = 30*time.Millisecond, 30*time.Millisecond
	port, err := net.Listen("tcp", "127.0.0.1:0")
	if err != nil {
		t.Fatal(err)
	}
	go impatient.Serve(port)
	defer impatient.Close()
	key := s.create(lamp)
	view := s.share(key, "view", "Bench 3")
	l := listen(t, "http://"+port.Addr().String(), view, "")
	l.want(1)
	for pings := 0; pings < 10 && l.lines.Scan(); {
		if l.lines.Text() == ": here" {
			pings++
		}
	}
	s.want(200, "POST", "/api/v1/sheets/"+key+"/edits", edits(1, "", addResistor))
	l.want(2)
	if open := s.server.meters.streams.Load(); open != 1 {
		t.Errorf("%d streams are open, want 1", open)
	}
	s.want(204, "DELETE", "/api/v1/sheets/"+key+"/keys/Bench%203", "")
	if got := l.next(); got != "end" {
		t.Errorf("after the key was withdrawn comes %q, want the end", got)
	}
}

func TestTheServerEndsStreamsAndFinishesRequests(t *testing.T) {
	s := run(t)
	port, err := net.Listen("tcp", "127.0.0.1:0")
	if err != nil {
		t.Fatal(err)
	}
	meters, err := net.Listen("tcp", "127.0.0.1:0")
	if err != nil {
		t.Fatal(err)
	}
	ctx, cancel := context.WithCancel(context.Background())
	ended := make(chan error, 1)
	go func() { ended <- s.server.Serve(ctx, port, meters) }()
	s.http.URL = "http://" + port.Addr().String()
	key := s.create(lamp)
	l := listen(t, s.http.URL, key, "")
	l.want(1)
	s.http.URL = "http://" + meters.Addr().String()
	text := s.send("GET", "/metrics", "").body
	for _, line := range []string{
		`loopwright_requests_total{method="POST",route="/api/v1/sheets",status="201"} 1`, "loopwright_event_streams 1",
		"loopwright_edit_seconds_count 0",
	} {
		if !strings.Contains(text, line) {
			t.Errorf("the metrics have no line %s:\n%s", line, text)
		}
	}
	if strings.Contains(text, key) {
		t.Error("a key is in the metrics")
	}
	s.want(404, "GET", "/", "")
	cancel()
	if got := l.next(); got != "end" {
		t.Errorf("the stream goes on with %q", got)
	}
	if err := <-ended; err != nil {
		t.Errorf("the server ends with %v", err)
	}
	if _, err := net.Dial("tcp", port.Addr().String()); err == nil {
		t.Error("the server still takes connections")
	}
}
