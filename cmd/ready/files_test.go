package main

import (
	"os"
	"path/filepath"
	"slices"
	"testing"
)

func TestGofmtDecidesWhatIsFormatted(t *testing.T) {
	for text, want := range map[string]bool{
		"package p\n\nvar a = 1\n": true,
		"package p\n\nvar  a=1\n":  false,
		"package p\n\nvar a = 1":   false,
		"package p\nvar a = [\n":   false,
	} {
		if formatted([]byte(text)) != want {
			t.Errorf("%q: want %t", text, want)
		}
	}
}

func TestFilesAreFoundOutsideHiddenFolders(t *testing.T) {
	root := t.TempDir()
	for _, name := range []string{"a_templ.go", "web/b_templ.go", "web/b.go", ".cache/c_templ.go", "web/.old/d_templ.go"} {
		path := filepath.Join(root, name)
		if err := os.MkdirAll(filepath.Dir(path), 0o755); err != nil {
			t.Fatal(err)
		}
		if err := os.WriteFile(path, nil, 0o644); err != nil {
			t.Fatal(err)
		}
	}
	got, err := filesEnding(root, generatedEnding)
	if err != nil {
		t.Fatal(err)
	}
	if want := []string{filepath.Join(root, "a_templ.go"), filepath.Join(root, "web/b_templ.go")}; !slices.Equal(got, want) {
		t.Errorf("found %v, want %v", got, want)
	}
}

func TestStaleFilesAreThoseThatCameWentOrChanged(t *testing.T) {
	before := map[string]string{"same": "1", "changed": "1", "gone": "1", "empty": ""}
	after := map[string]string{"same": "1", "changed": "2", "came": "", "empty": ""}
	if got, want := different(before, after), []string{"came", "changed", "gone"}; !slices.Equal(got, want) {
		t.Errorf("got %v, want %v", got, want)
	}
}
