package main

import (
	"bufio"
	"bytes"
	"context"
	"io"
	"net"
	"net/http"
	"os"
	"path/filepath"
	"strings"
	"testing"
)

func TestServeServesUntilItIsToldToStop(t *testing.T) {
	database := filepath.Join(t.TempDir(), "sheets.db")
	ctx, cancel := context.WithCancel(context.Background())
	defer cancel()
	said, says := io.Pipe()
	code := make(chan int, 1)
	go func() {
		code <- run(ctx, []string{"serve", "--listen", "127.0.0.1:0", "--database", database, "--metrics", "127.0.0.1:0"},
			streams{strings.NewReader(""), io.Discard, says})
		says.Close()
	}()
	lines := bufio.NewScanner(said)
	address, found := "", false
	for !found && lines.Scan() {
		address, found = strings.CutPrefix(lines.Text(), "Loopwright is at ")
	}
	go io.Copy(io.Discard, said)
	response, err := http.Get(address + "/readyz")
	if err != nil {
		t.Fatal(err)
	}
	response.Body.Close()
	if response.StatusCode != http.StatusOK {
		t.Errorf("the server answers %d", response.StatusCode)
	}
	cancel()
	if got := <-code; got != 0 {
		t.Errorf("the program ends with code %d, want 0", got)
	}
	if _, err := os.Stat(database); err != nil {
		t.Errorf("there is no database: %v", err)
	}
}

func TestServeSaysInOneLineWhyItCannotServe(t *testing.T) {
	taken, err := net.Listen("tcp", "127.0.0.1:0")
	if err != nil {
		t.Fatal(err)
	}
	defer taken.Close()
	directory := t.TempDir()
	database := filepath.Join(directory, "sheets.db")
	for _, c := range []struct {
		name      string
		arguments []string
		says      string
	}{
		{"address in use", []string{"--listen", taken.Addr().String(), "--database", database}, "choose another address with --listen"},
		{"no address", []string{"--listen", "here", "--database", database}, "choose another address with --listen"},
		{"address of metrics in use", []string{"--listen", "127.0.0.1:0", "--metrics", taken.Addr().String(), "--database", database}, "--metrics"},
		{"no directory", []string{"--listen", "127.0.0.1:0", "--database", filepath.Join(directory, "none", "a.db")}, "there is no directory"},
		{"PostgreSQL", []string{"--listen", "127.0.0.1:0", "--database", "postgres://localhost/sheets"}, "cannot be used yet"},
		{"unknown flag", []string{"--port", "80"}, "--port"},
	} {
		t.Run(c.name, func(t *testing.T) {
			var said bytes.Buffer
			code := run(context.Background(), append([]string{"serve"}, c.arguments...), streams{strings.NewReader(""), io.Discard, &said})
			text := said.String()
			if code != 2 || !strings.Contains(text, c.says) || strings.Count(text, "\n") != 1 {
				t.Errorf("the program ends with code %d and says %q", code, text)
			}
		})
	}
	if _, err := os.Stat(database); err == nil {
		t.Error("a database was made although nothing could be served")
	}
}

func TestAnAddressIsShownAsABrowserReachesIt(t *testing.T) {
	for _, c := range []struct {
		address string
		shown   string
		local   bool
	}{
		{"127.0.0.1:8080", "127.0.0.1:8080", true},
		{"[::1]:8080", "[::1]:8080", true},
		{"0.0.0.0:8080", "localhost:8080", false},
		{"[::]:8080", "localhost:8080", false},
		{"192.0.2.7:8080", "192.0.2.7:8080", false}, // RFC 5737, an address for documentation
	} {
		address, err := net.ResolveTCPAddr("tcp", c.address)
		if err != nil {
			t.Fatal(err)
		}
		if shown(address) != c.shown || isLocal(address) != c.local {
			t.Errorf("%s is shown as %s, local %v", c.address, shown(address), isLocal(address))
		}
	}
}
