package browser

import (
	"bufio"
	"bytes"
	"context"
	"encoding/json"
	"errors"
	"fmt"
	"io"
	"net/http"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"sync"
	"testing"
	"time"

	"github.com/chromedp/chromedp"
)

// patience bounds every wait for the page; a test that needs it all has failed.
const patience = 20 * time.Second

// bench is what all tests share: the program that serves and the browser that looks.
type bench struct {
	address string
	browser context.Context
}

var shared bench

func TestMain(m *testing.M) {
	os.Exit(run(m))
}

func run(m *testing.M) int {
	chromium, err := findChromium()
	if err != nil {
		if os.Getenv("LOOPWRIGHT_BROWSER") == "required" {
			fmt.Fprintln(os.Stderr, err)
			return 1
		}
		fmt.Println("skipped all browser tests:", err)
		return m.Run() // each test skips itself, and says so
	}
	folder, err := os.MkdirTemp("", "loopwright-browser-")
	if err != nil {
		fmt.Fprintln(os.Stderr, err)
		return 1
	}
	defer os.RemoveAll(folder)
	stopServer, err := startServer(folder)
	if err != nil {
		fmt.Fprintln(os.Stderr, err)
		return 1
	}
	defer stopServer()
	stopBrowser, err := startBrowser(chromium, folder)
	if err != nil {
		fmt.Fprintln(os.Stderr, err)
		return 1
	}
	defer stopBrowser()
	return m.Run()
}

func findChromium() (string, error) {
	for _, name := range []string{"chromium", "chromium-browser", "google-chrome"} {
		if path, err := exec.LookPath(name); err == nil {
			return path, nil
		}
	}
	return "", errors.New("no Chromium was found: install Debian's package chromium")
}

// startServer builds the program and serves a new database on a free port.
func startServer(folder string) (stop func(), err error) {
	program := filepath.Join(folder, "loopwright")
	if out, err := exec.Command("go", "build", "-o", program, "loopwright/cmd/loopwright").CombinedOutput(); err != nil {
		return nil, fmt.Errorf("building the program: %v\n%s", err, out)
	}
	server := exec.Command(program, "serve", "--listen", "127.0.0.1:0", "--database", filepath.Join(folder, "test.db"))
	said, err := server.StderrPipe()
	if err != nil {
		return nil, err
	}
	if err := server.Start(); err != nil {
		return nil, err
	}
	stop = func() {
		_ = server.Process.Kill()
		_ = server.Wait()
	}
	lines := bufio.NewScanner(said)
	for lines.Scan() {
		if _, address, found := strings.Cut(lines.Text(), "Loopwright is at "); found {
			shared.address = strings.TrimSpace(address)
			go func() { _, _ = io.Copy(io.Discard, said) }()
			return stop, nil
		}
	}
	stop()
	return nil, errors.New("the program ended without saying where it serves")
}

func startBrowser(path, folder string) (stop func(), err error) {
	allocator, stopAllocator := chromedp.NewExecAllocator(context.Background(),
		chromedp.ExecPath(path), chromedp.UserDataDir(filepath.Join(folder, "profile")), chromedp.Headless, chromedp.NoSandbox,
		chromedp.DisableGPU, chromedp.NoFirstRun, chromedp.Flag("disable-background-networking", true),
		chromedp.Flag("disable-component-update", true), chromedp.Flag("disable-sync", true), chromedp.WindowSize(1440, 900))
	browser, stopBrowser := chromedp.NewContext(allocator)
	if err := chromedp.Do(browser); err != nil {
		stopBrowser()
		stopAllocator()
		return nil, fmt.Errorf("starting Chromium: %w", err)
	}
	shared.browser = browser
	return func() { stopBrowser(); stopAllocator() }, nil
}

// needsBrowser skips a test where there is no Chromium.
func needsBrowser(t *testing.T) {
	t.Helper()
	if shared.browser == nil {
		t.Skip("needs Chromium: install Debian's package chromium")
	}
}

// newSheet stores a sheet and gives its edit key.
func newSheet(t *testing.T, sheet []byte) string {
	t.Helper()
	var made struct {
		EditKey string `json:"edit_key"`
	}
	post(t, "/api/v1/sheets", sheet, http.StatusCreated, &made)
	return made.EditKey
}

// emptySheet is a sheet on which nothing is drawn.
func emptySheet(t *testing.T) string {
	t.Helper()
	return newSheet(t, []byte(`{"format":"loopwright-sheet/1","title":"Drawn by hand","system":{"kind":"dc"},"parts":[],"wires":[]}`))
}

func post(t *testing.T, path string, body []byte, want int, into any) {
	t.Helper()
	answer, err := http.Post(shared.address+path, "application/json", bytes.NewReader(body))
	if err != nil {
		t.Fatal(err)
	}
	read(t, answer, want, into)
}

func get(t *testing.T, path string, into any) {
	t.Helper()
	answer, err := http.Get(shared.address + path)
	if err != nil {
		t.Fatal(err)
	}
	read(t, answer, http.StatusOK, into)
}

func read(t *testing.T, answer *http.Response, want int, into any) {
	t.Helper()
	defer answer.Body.Close()
	data, err := io.ReadAll(answer.Body)
	if err != nil {
		t.Fatal(err)
	}
	if answer.StatusCode != want {
		t.Fatalf("status %d, want %d: %s", answer.StatusCode, want, data)
	}
	if err := json.Unmarshal(data, into); err != nil {
		t.Fatalf("%v in %s", err, data)
	}
}

// tab is one open page, together with what went wrong on it.
type tab struct {
	*testing.T
	ctx context.Context

	mu      sync.Mutex
	trouble []string
}
