// Package static holds the files that a browser is sent as they are: styles, modules, the typeface, vendored htmx.
//
// All of them are served under one address that contains the digest of them all, so that browsers may keep them for
// ever, and modules that import each other by relative path still match.
package static

import (
	"bytes"
	"compress/gzip"
	"crypto/sha256"
	"embed"
	"encoding/hex"
	"io/fs"
	"net/http"
	"path"
	"strconv"
	"strings"
	"sync"
)

//go:embed css js vendor/htmx/htmx.min.js font/*.ttf font/*.woff2 icon
var files embed.FS

// Regular is the typeface of the drawing, as TrueType.
func Regular() []byte { return mustRead("font/loopwright-regular.ttf") }

// Bold is the bold cut of the typeface of the drawing, as TrueType.
func Bold() []byte { return mustRead("font/loopwright-bold.ttf") }

// mustRead reads a file that is known to be embedded.
func mustRead(name string) []byte {
	data, err := files.ReadFile(name)
	if err != nil {
		panic("static: " + err.Error())
	}
	return data
}

// asset is one file, ready to be sent.
type asset struct {
	kind   string
	plain  []byte
	zipped []byte // nil where compressing gains nothing
}

// pack is all files and their common digest.
type pack struct {
	digest string
	assets map[string]asset
}

var load = sync.OnceValue(func() pack {
	p := pack{assets: make(map[string]asset)}
	sum := sha256.New()
	err := fs.WalkDir(files, ".", func(name string, entry fs.DirEntry, err error) error {
		if err != nil || entry.IsDir() {
			return err
		}
		data := mustRead(name)
		sum.Write([]byte(name))
		sum.Write(data)
		p.assets[name] = asset{kinds[path.Ext(name)], data, zip(data)}
		return nil
	})
	if err != nil {
		panic("static: " + err.Error())
	}
	p.digest = hex.EncodeToString(sum.Sum(nil))[:16]
	return p
})

var kinds = map[string]string{
	".css":   "text/css; charset=utf-8",
	".js":    "text/javascript; charset=utf-8",
	".svg":   "image/svg+xml",
	".woff2": "font/woff2",
	".ttf":   "font/ttf",
}

// zip compresses, and gives nil unless that saves at least a tenth.
func zip(data []byte) []byte {
	var out bytes.Buffer
	writer, _ := gzip.NewWriterLevel(&out, gzip.BestCompression) // the level is a valid one
	if _, err := writer.Write(data); err != nil {
		return nil
	}
	if err := writer.Close(); err != nil || out.Len() > len(data)*9/10 {
		return nil
	}
	return out.Bytes()
}

// Path is the address of a file: Path("css/desk.css").
func Path(name string) string { return "/static/" + load().digest + "/" + name }

// Handler answers below /static/. Unknown files and addresses of another version are not found; nothing is listed.
func Handler() http.Handler {
	return http.HandlerFunc(func(w http.ResponseWriter, r *http.Request) {
		p := load()
		name, found := strings.CutPrefix(r.URL.Path, "/static/"+p.digest+"/")
		file, known := p.assets[name]
		if !found || !known {
			http.NotFound(w, r)
			return
		}
		header := w.Header()
		header.Set("Content-Type", file.kind)
		header.Set("Cache-Control", "public, max-age=31536000, immutable")
		header.Add("Vary", "Accept-Encoding")
		body := file.plain
		if file.zipped != nil && acceptsGzip(r.Header.Get("Accept-Encoding")) {
			header.Set("Content-Encoding", "gzip")
			body = file.zipped
		}
		header.Set("Content-Length", strconv.Itoa(len(body)))
		if r.Method != http.MethodHead {
			_, _ = w.Write(body) // nobody is left to tell when the browser has gone
		}
	})
}

// acceptsGzip reports whether an Accept-Encoding header (RFC 9110, section 12.5.3) names gzip with a weight above 0.
func acceptsGzip(accepted string) bool {
	for offer := range strings.SplitSeq(accepted, ",") {
		coding, parameter, weighted := strings.Cut(offer, ";")
		if !strings.EqualFold(strings.TrimSpace(coding), "gzip") {
			continue
		}
		if !weighted {
			return true
		}
		_, value, _ := strings.Cut(parameter, "=")
		weight, err := strconv.ParseFloat(strings.TrimSpace(value), 64)
		return err == nil && weight > 0
	}
	return false
}
