package static_test

import (
	"bytes"
	"compress/gzip"
	"io"
	"net/http"
	"net/http/httptest"
	"strings"
	"testing"

	"loopwright/static"
)

func fetch(t *testing.T, path, accept string) *http.Response {
	t.Helper()
	request := httptest.NewRequest(http.MethodGet, path, nil)
	request.Header.Set("Accept-Encoding", accept)
	answer := httptest.NewRecorder()
	static.Handler().ServeHTTP(answer, request)
	return answer.Result()
}

func TestFilesAreServedWithTheirKindForEver(t *testing.T) {
	for name, kind := range map[string]string{
		"css/base.css": "text/css; charset=utf-8", "js/app.js": "text/javascript; charset=utf-8",
		"vendor/htmx/htmx.min.js": "text/javascript; charset=utf-8", "font/loopwright-regular.woff2": "font/woff2", "icon/favicon.svg": "image/svg+xml",
	} {
		answer := fetch(t, static.Path(name), "")
		if answer.StatusCode != http.StatusOK || answer.Header.Get("Content-Type") != kind || !strings.Contains(answer.Header.Get("Cache-Control"), "immutable") {
			t.Errorf("%s: %d %v", name, answer.StatusCode, answer.Header)
		}
	}
}

func TestACompressedFileIsTheSameFile(t *testing.T) {
	plain, err := io.ReadAll(fetch(t, static.Path("js/app.js"), "").Body)
	if err != nil {
		t.Fatal(err)
	}
	answer := fetch(t, static.Path("js/app.js"), "gzip, br")
	if answer.Header.Get("Content-Encoding") != "gzip" {
		t.Fatal("not compressed")
	}
	reader, err := gzip.NewReader(answer.Body)
	if err != nil {
		t.Fatal(err)
	}
	unpacked, err := io.ReadAll(reader)
	if err != nil || !bytes.Equal(plain, unpacked) {
		t.Errorf("unpacks to other bytes (%v)", err)
	}
}

// The weights are those of RFC 9110, section 12.5.3: 0 means "not acceptable".
func TestAFileIsCompressedOnlyForThoseWhoAcceptIt(t *testing.T) {
	for accept, want := range map[string]string{
		"": "", "gzip": "gzip", "br, gzip": "gzip", "deflate, GZIP;q=0.5": "gzip", "gzip; q=1.0, br": "gzip",
		"gzip;q=0": "", "gzip; q=0.000, br": "", "br, deflate": "", "xgzip": "", "identity": "",
	} {
		answer := fetch(t, static.Path("css/base.css"), accept)
		if got := answer.Header.Get("Content-Encoding"); got != want || answer.Header.Get("Vary") != "Accept-Encoding" {
			t.Errorf("Accept-Encoding %q: Content-Encoding %q, want %q; Vary %q", accept, got, want, answer.Header.Get("Vary"))
		}
	}
}

func TestAHeadOfAFileIsItsHeaderAlone(t *testing.T) {
	request := httptest.NewRequest(http.MethodHead, static.Path("icon/favicon.svg"), nil)
	answer := httptest.NewRecorder()
	static.Handler().ServeHTTP(answer, request)
	if answer.Code != http.StatusOK || answer.Body.Len() != 0 || answer.Header().Get("Content-Length") == "" {
		t.Errorf("%d, %d bytes, %v", answer.Code, answer.Body.Len(), answer.Header())
	}
}

func TestOtherVersionsFoldersAndLicencesAreNotFound(t *testing.T) {
	for _, path := range []string{"/static/0123456789abcdef/css/base.css", static.Path(""), static.Path("css"), static.Path("css/"), static.Path("../static.go"), "/static/"} {
		if answer := fetch(t, path, ""); answer.StatusCode != http.StatusNotFound {
			t.Errorf("%s: %d", path, answer.StatusCode)
		}
	}
}
