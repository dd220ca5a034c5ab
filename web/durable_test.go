package web

import (
	"bufio"
	"context"
	"encoding/json"
	"fmt"
	"io"
	"math/rand/v2"
	"net"
	"net/http"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"sync"
	"sync/atomic"
	"testing"

	"loopwright/web/store"
)

// databaseVariable names the database that this program serves, instead of testing, when a test starts it again.
const databaseVariable = "LOOPWRIGHT_TEST_DATABASE"

func TestMain(m *testing.M) {
	if name := os.Getenv(databaseVariable); name != "" {
		if err := serveAlone(name); err != nil {
			fmt.Fprintln(os.Stderr, err)
			os.Exit(1)
		}
		return
	}
	os.Exit(m.Run())
}

// serveAlone serves a database, tells its address in a line, and goes on until it is killed.
func serveAlone(name string) error {
	sheets, err := store.Open(context.Background(), name)
	if err != nil {
		return err
	}
	server, err := New(Config{Store: sheets})
	if err != nil {
		return err
	}
	listener, err := net.Listen("tcp", "127.0.0.1:0")
	if err != nil {
		return err
	}
	fmt.Println(listener.Addr())
	return server.Serve(context.Background(), listener, nil)
}

// process is a server in a process of its own.
type process struct {
	command *exec.Cmd
	address string
}

func start(t *testing.T, database string) *process {
	t.Helper()
	command := exec.Command(os.Args[0])
	command.Env = append(os.Environ(), databaseVariable+"="+database)
	command.Stderr = os.Stderr
	out, err := command.StdoutPipe()
	if err != nil {
		t.Fatal(err)
	}
	if err := command.Start(); err != nil {
		t.Fatal(err)
	}
	line, err := bufio.NewReader(out).ReadString('\n')
	if err != nil {
		t.Fatalf("the server says nothing: %v", err)
	}
	p := &process{command, "http://" + strings.TrimSpace(line)}
	t.Cleanup(p.kill) // should the test end early
	return p
}

// kill ends the process without a warning and waits until it is gone.
func (p *process) kill() {
	p.command.Process.Kill()
	p.command.Wait()
}

// ledger is what the senders of edits know.
type ledger struct {
	mutex   sync.Mutex
	next    int
	unknown []int       // sent, and not answered
	answers map[int]int // by number of the batch: the revision that was answered
	refs    map[int]string
}

// take gives the number of the next batch to send: one whose answer was lost, or a new one.
func (l *ledger) take() int {
	l.mutex.Lock()
	defer l.mutex.Unlock()
	if last := len(l.unknown) - 1; last >= 0 {
		number := l.unknown[last]
		l.unknown = l.unknown[:last]
		return number
	}
	l.next++
	return l.next
}

func (l *ledger) lost(number int) {
	l.mutex.Lock()
	defer l.mutex.Unlock()
	l.unknown = append(l.unknown, number)
}

func (l *ledger) answered(t *testing.T, number int, body []byte) {
	var answer store.Answer
	if err := json.Unmarshal(body, &answer); err != nil || len(answer.Made.Refs) != 1 {
		t.Errorf("batch %d is answered %s", number, body)
		return
	}
	l.mutex.Lock()
	defer l.mutex.Unlock()
	if before, known := l.answers[number]; known && before != answer.Revision {
		t.Errorf("batch %d was answered revision %d and then %d", number, before, answer.Revision)
	}
	l.answers[number], l.refs[number] = answer.Revision, answer.Made.Refs[0]
}

// Twenty times a server is killed while four senders wait for answers. Whatever was answered is on the sheet, exactly
// once; what was not answered is sent again under the same id, and is on the sheet exactly once too.
func TestWhatWasAnsweredSurvivesTheEndOfTheProcess(t *testing.T) {
	database := filepath.Join(t.TempDir(), "sheets.db")
	random := rand.New(rand.NewPCG(20, 7))
	known := &ledger{answers: map[int]int{}, refs: map[int]string{}}
	key := ""
	for range 20 {
		server := start(t, database)
		if key == "" {
			key = create(t, server.address)
		}
		sendUntilKilled(t, server, key, known, 1+random.Int64N(30))
	}
	server := start(t, database)
	for number := range known.next {
		known.send(t, server.address, key, number+1)
	}
	known.compare(t, server.address, key)
}

func create(t *testing.T, address string) string {
	t.Helper()
	response, err := http.Post(address+"/api/v1/sheets", "application/json", strings.NewReader(lamp))
	if err != nil {
		t.Fatal(err)
	}
	defer response.Body.Close()
	var created struct {
		Key string `json:"edit_key"`
	}
	if err := json.NewDecoder(response.Body).Decode(&created); err != nil {
		t.Fatal(err)
	}
	return created.Key
}

// sendUntilKilled has four senders at work, and kills the server once so many of their batches have been answered.
func sendUntilKilled(t *testing.T, server *process, key string, known *ledger, enough int64) {
	var count atomic.Int64
	var wait sync.WaitGroup
	for range 4 {
		wait.Go(func() {
			for known.send(t, server.address, key, known.take()) {
				if count.Add(1) == enough {
					server.kill()
				}
			}
		})
	}
	wait.Wait()
}

// send sends a batch and reports whether it was answered.
func (l *ledger) send(t *testing.T, address, key string, batch int) bool {
	response, err := http.Post(address+"/api/v1/sheets/"+key+"/edits", "application/json",
		strings.NewReader(edits(batch, "", fmt.Sprintf(`{"do": "add", "part": {"kind": "resistor", "at": [%d, 30]}}`, 4*batch))))
	if err != nil {
		l.lost(batch)
		return false
	}
	defer response.Body.Close()
	body, err := io.ReadAll(response.Body)
	if err != nil {
		l.lost(batch)
		return false
	}
	if response.StatusCode != http.StatusOK {
		t.Errorf("batch %d is answered %d %s", batch, response.StatusCode, body)
		return false
	}
	l.answered(t, batch, body)
	return true
}

// compare checks that each answered batch is on the sheet, and nothing else is.
func (l *ledger) compare(t *testing.T, address, key string) {
	t.Helper()
	response, err := http.Get(address + "/api/v1/sheets/" + key)
	if err != nil {
		t.Fatal(err)
	}
	defer response.Body.Close()
	var shown struct {
		Sheet struct {
			Parts []struct {
				Ref, Kind string
				At        [2]int
			}
		}
		Revision int
	}
	if err := json.NewDecoder(response.Body).Decode(&shown); err != nil {
		t.Fatal(err)
	}
	places := map[string]int{}
	for _, part := range shown.Sheet.Parts {
		if part.Kind == "resistor" {
			places[part.Ref] = part.At[0] / 4
		}
	}
	for number, ref := range l.refs {
		if places[ref] != number {
			t.Errorf("batch %d made %s, which stands at the place of batch %d", number, ref, places[ref])
		}
	}
	if len(places) != l.next || len(l.refs) != l.next || shown.Revision != 1+l.next {
		t.Errorf("of %d batches, %d were answered; the sheet holds %d at revision %d", l.next, len(l.refs), len(places), shown.Revision)
	}
	if l.next < 100 {
		t.Errorf("only %d batches were sent", l.next)
	}
}
