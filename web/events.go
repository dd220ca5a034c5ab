package web

import (
	"fmt"
	"net/http"
	"strconv"
	"time"

	"loopwright/web/store"
)

const (
	// mostStreams is how many streams of events may be open at once.
	mostStreams = 5_000
	// mostMissed is how many revisions somebody may have missed and still hear of each of them.
	mostMissed = 100
	// patience is how long a reader may take to accept what is sent.
	patience = 10 * time.Second
)

// streamEvents answers GET /api/v1/sheets/{key}/events: a stream of server-sent events that tells of every revision once
// it is durable, beginning with the newest there is, or with those after Last-Event-ID.
func (s *Server) streamEvents(w http.ResponseWriter, r *http.Request) error {
	access, err := s.opened(r)
	if err != nil {
		return err
	}
	if s.meters.streams.Add(1) > mostStreams {
		s.meters.streams.Add(-1)
		return &problem{status: http.StatusServiceUnavailable, message: "Too many pages are open at once; this one gets no news for now."}
	}
	defer s.meters.streams.Add(-1)
	revisions, cancel := s.store.Subscribe(access.Sheet)
	defer cancel()
	// What became durable before the subscription is not told there, so the newest revision is looked up after it.
	if access, err = s.opened(r); err != nil {
		return err
	}
	h := w.Header()
	h.Set("Content-Type", "text/event-stream")
	h.Set("X-Accel-Buffering", "no") // a common sign to proxies not to hold back the stream
	stream := &stream{writer: w, control: http.NewResponseController(w)}
	if last, err := strconv.Atoi(r.Header.Get("Last-Event-ID")); err == nil && last > 0 && last < access.Revision {
		stream.told = last
	} else {
		stream.told = access.Revision - 1
	}
	if r.Method == http.MethodHead || stream.open() != nil || stream.tell(access.Revision) != nil {
		return nil
	}
	s.follow(r, stream, access, revisions)
	return nil
}

// follow tells of revisions until the reader goes, the key ends or the server does.
func (s *Server) follow(r *http.Request, stream *stream, access store.Access, revisions <-chan int) {
	ping := time.NewTicker(s.pingEvery)
	defer ping.Stop()
	for {
		var err error
		select {
		case <-r.Context().Done():
			return
		case <-s.ending.Done():
			return
		case revision := <-revisions:
			err = stream.tell(revision)
		case <-ping.C:
			if _, err = s.opened(r); err == nil { // the key may have been withdrawn
				err = stream.ping()
			}
		}
		if err != nil {
			return
		}
	}
}

// stream writes events to one reader.
type stream struct {
	writer  http.ResponseWriter
	control *http.ResponseController
	told    int // the newest revision that the reader has heard of
}

// open lifts the limits that hold for other answers, and sends the headers.
func (t *stream) open() error {
	if err := t.control.SetReadDeadline(time.Time{}); err != nil {
		return err
	}
	return t.ping()
}

// tell sends an event for each revision up to the newest. Who has missed many hears only of the newest.
func (t *stream) tell(newest int) error {
	if newest-t.told > mostMissed {
		t.told = newest - 1
	}
	var events []byte
	for t.told < newest {
		t.told++
		events = fmt.Appendf(events, "id: %d\nevent: revision\ndata: {\"revision\":%d}\n\n", t.told, t.told)
	}
	return t.send(events)
}

// ping sends a comment, which shows to both ends that the other is there.
func (t *stream) ping() error { return t.send([]byte(": here\n\n")) }

func (t *stream) send(data []byte) error {
	if err := t.control.SetWriteDeadline(time.Now().Add(patience)); err != nil {
		return err
	}
	if _, err := t.writer.Write(data); err != nil {
		return err
	}
	return t.control.Flush()
}
