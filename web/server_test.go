package web

import (
	"context"
	"encoding/csv"
	"net/http"
	"net/http/httptest"
	"strings"
	"sync"
	"testing"
	"time"

	"loopwright/schematic"
)

func TestTheLogHoldsNoKey(t *testing.T) {
	s := run(t)
	edit := s.create(lamp)
	view := s.share(edit, "view", "Bench 3")
	wrong := "wr0ngwr0ngwr0ngwr0ngwr0ngwr0ngwr"
	for _, key := range []string{edit, view, wrong} {
		for _, path := range []string{
			"/api/v1/sheets/" + key, "/api/v1/sheets/" + key + "/solution", "/s/" + key + "/sheet.json", "/s/" + key + "/nowhere",
			"/elsewhere/" + key, "/" + key, "/api/v1/sheets/" + key + "/keys/x", "/api/v1/sheets/%zz" + key, "/s/" + key + "/drawing.svg?case=x;y",
		} {
			s.sendRaw("GET " + path + " HTTP/1.1\r\nHost: localhost\r\nReferer: http://localhost/s/" + key + "\r\nConnection: close\r\n\r\n")
		}
		s.send("POST", "/api/v1/sheets/"+key+"/edits", edits(1, "", addResistor))
		s.send("POST", "/api/v1/sheets/"+key+"/keys", `{"role": "view", "name": "Bench 3"}`)
		s.send(key, "/api/v1/sheets/"+key, "")
	}
	// The database goes away, so that requests fail inside.
	if err := s.store.Close(); err != nil {
		t.Fatal(err)
	}
	got := s.send("GET", "/api/v1/sheets/"+edit, "")
	if got.status != 500 || strings.Contains(got.body, "database") || !strings.Contains(got.body, "report request") {
		t.Errorf("an internal error is answered %d %s", got.status, got.body)
	}
	log := s.log.String()
	for _, line := range []string{"route=/api/v1/sheets/{key}/edits", "route=unmatched", "status=404", `msg="request failed"`, "database is closed"} {
		if !strings.Contains(log, line) {
			t.Errorf("the log has no line with %s", line)
		}
	}
	for _, key := range []string{edit, view, wrong} {
		if strings.Contains(log, key) {
			t.Errorf("the key %s is in the log:\n%s", key, log)
		}
	}
}

func TestTheProgramTellsThatItLivesAndIsReady(t *testing.T) {
	s := run(t)
	for _, path := range []string{"/healthz", "/readyz"} {
		if got := s.send("GET", path, ""); got.status != 200 || got.body != "ok\n" {
			t.Errorf("%s answers %d %q", path, got.status, got.body)
		}
		if got := s.send("HEAD", path, ""); got.status != 200 || got.body != "" {
			t.Errorf("%s answers %d %q to HEAD", path, got.status, got.body)
		}
	}
	s.store.Close()
	if got := s.send("GET", "/healthz", ""); got.status != 200 {
		t.Errorf("without its database the program answers %d, want 200: it lives", got.status)
	}
	if got := s.send("GET", "/readyz", ""); got.status != 503 || got.header.Get("Retry-After") == "" {
		t.Errorf("without its database the program answers %d, want 503: it is not ready", got.status)
	}
}

func TestAWrongMethodIsToldTheRightOnes(t *testing.T) {
	s := run(t)
	got := s.send("PATCH", "/api/v1/sheets/"+s.create(lamp), "")
	if allowed := strings.Join(got.header.Values("Allow"), " "); got.status != 405 || allowed != "GET, HEAD" {
		t.Errorf("PATCH answers %d and allows %q, want 405 and GET, HEAD", got.status, allowed)
	}
}

func TestAPanicIsAnsweredAndTheServerGoesOn(t *testing.T) {
	s := run(t)
	broken := s.server.recoverer(http.HandlerFunc(func(http.ResponseWriter, *http.Request) { panic("out of order") }))
	recorder := httptest.NewRecorder()
	s.server.observe(broken).ServeHTTP(recorder, withRoute(httptest.NewRequest("GET", "/s/secret", nil)))
	if recorder.Code != 500 || strings.Contains(recorder.Body.String(), "order") {
		t.Errorf("a panic is answered %d %s", recorder.Code, recorder.Body)
	}
	if log := s.log.String(); !strings.Contains(log, "out of order") || strings.Contains(log, "secret") {
		t.Errorf("the log says %s", log)
	}
}

func TestReadingsAreATableOfAllCases(t *testing.T) {
	s := run(t)
	key := s.create(strings.ReplaceAll(lamp, `"Light on"`, `"=HYPERLINK(1)"`))
	got := s.send("GET", "/s/"+key+"/readings.csv", "")
	if got.status != 200 || got.header.Get("Content-Type") != "text/csv; charset=utf-8" ||
		got.header.Get("Content-Disposition") != "attachment; filename=HL-0001.readings.csv" {
		t.Fatalf("the readings come with %d and %v", got.status, got.header)
	}
	rows, err := csv.NewReader(strings.NewReader(got.body)).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	if len(rows) < 7 {
		t.Errorf("the table has %d rows", len(rows))
	}
	for _, row := range rows {
		for _, cell := range row {
			if strings.HasPrefix(cell, "=") || strings.HasPrefix(cell, "+") || strings.HasPrefix(cell, "@") {
				t.Errorf("the cell %q is a formula to a spreadsheet", cell)
			}
		}
	}
}

func TestTheDrawingShowsOneCase(t *testing.T) {
	s := run(t)
	key := s.create(lamp)
	rest, light := s.send("GET", "/s/"+key+"/drawing.svg", ""), s.send("GET", "/s/"+key+"/drawing.svg?case=Light+on", "")
	for _, got := range []answer{rest, light} {
		if got.status != 200 || got.header.Get("Content-Type") != "image/svg+xml" || !strings.Contains(got.body, "<svg") {
			t.Fatalf("the drawing is answered %d %v", got.status, got.header)
		}
	}
	if rest.body == light.body {
		t.Error("both cases give the same drawing")
	}
	if got := s.send("GET", "/s/"+key+"/drawing.svg?case=None", ""); got.status != 404 {
		t.Errorf("a case that does not exist answers %d, want 404", got.status)
	}
}

func TestDownloadsHaveNamesThatFilesCanHave(t *testing.T) {
	for _, c := range []struct{ number, title, want string }{
		{"HL-1002", "Pump", "inline; filename=HL-1002.svg"},
		{"", "Pump P2 start", `inline; filename="Pump P2 start.svg"`},
		{"", "", "inline; filename=sheet.svg"},
		{"../../etc/passwd", "", "inline; filename=-..-etc-passwd.svg"},
		{"a/b\\c:d\"e\n", "", "inline; filename=a-b-c-d-e.svg"},
		{"Größe", "", "inline; filename*=utf-8''Gr%C3%B6%C3%9Fe.svg"},
	} {
		recorder := httptest.NewRecorder()
		sheet := schematic.New(c.title)
		sheet.Number = c.number
		name(recorder, "inline", sheet, ".svg")
		if got := recorder.Header().Get("Content-Disposition"); got != c.want {
			t.Errorf("number %q and title %q give %s, want %s", c.number, c.title, got, c.want)
		}
	}
}

func TestASolutionIsWorkedOutOnceForAllWhoAsk(t *testing.T) {
	s := run(t)
	access, err := s.server.access(context.Background(), s.create(lamp))
	if err != nil {
		t.Fatal(err)
	}
	var wait sync.WaitGroup
	answers := make([]*solvedSheet, 20)
	for i := range answers {
		wait.Go(func() { answers[i], _ = s.server.solved(context.Background(), access.Sheet, 1) })
	}
	wait.Wait()
	for _, answer := range answers {
		if answer == nil || answer != answers[0] {
			t.Fatalf("the answers are %v", answers)
		}
	}
	if _, err := s.server.solved(context.Background(), access.Sheet, 2); err == nil {
		t.Error("a revision to come has a solution")
	}
}

func TestASolutionThatTakesTooLongIsGivenUp(t *testing.T) {
	s := run(t)
	key := s.create(lamp)
	s.server.solveLimit = time.Nanosecond
	if got := s.send("GET", "/api/v1/sheets/"+key+"/solution", ""); got.status != 503 || !strings.Contains(got.body, "divide the sheet") {
		t.Errorf("a solution without time is answered %d %s", got.status, got.body)
	}
	s.server.waitLimit = time.Nanosecond
	if got := s.send("POST", "/api/v1/solve", lamp); got.status != 503 || !strings.Contains(got.body, "busy") {
		t.Errorf("a server without a free processor answers %d %s", got.status, got.body)
	}
}

func TestLongAnswersAreCompressed(t *testing.T) {
	s := run(t)
	key := s.create(terminals(500))
	got := s.send("GET", "/s/"+key+"/sheet.json", "", "Accept-Encoding", "gzip")
	if got.header.Get("Content-Encoding") != "gzip" || !strings.Contains(got.header.Get("Vary"), "Accept-Encoding") {
		t.Errorf("the headers are %v", got.header)
	}
}

func TestAServerNeedsAStore(t *testing.T) {
	if _, err := New(Config{}); err == nil {
		t.Error("a server without a store was made")
	}
}

func TestAFormThatCannotBeReadIsRefused(t *testing.T) {
	s := run(t)
	key := s.create(lamp)
	form := []string{"Content-Type", "application/x-www-form-urlencoded"}
	for _, path := range []string{"/new", "/s/" + key + "/edit", "/s/" + key + "/share"} {
		if got := s.send("POST", path, "title=%zz", form...); got.status != 400 {
			t.Errorf("%s answers %d, want 400", path, got.status)
		}
		if got := s.send("POST", path, "title="+strings.Repeat("x", mostBody), form...); got.status != 413 {
			t.Errorf("%s answers %d to more than 4 MiB, want 413", path, got.status)
		}
	}
}
