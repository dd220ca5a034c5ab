package main

import (
	"bytes"
	"context"
	"fmt"
	"go/format"
	"io/fs"
	"os"
	"path/filepath"
	"strings"
)

// checkFormat names the Go files that gofmt would change. Generated ones are as their generator writes them.
func checkFormat(context.Context) error {
	files, err := filesEnding(".", ".go")
	if err != nil {
		return err
	}
	wrong := 0
	for _, name := range files {
		text, err := os.ReadFile(name)
		if err != nil {
			return err
		}
		if strings.HasSuffix(name, generatedEnding) || formatted(text) {
			continue
		}
		fmt.Println("gofmt -w", name)
		wrong++
	}
	if wrong > 0 {
		return fmt.Errorf("%d of %d files are not as gofmt writes them", wrong, len(files))
	}
	return nil
}

// formatted reports whether a Go source is as gofmt writes it; one that cannot be read is not.
func formatted(text []byte) bool {
	want, err := format.Source(text)
	return err == nil && bytes.Equal(text, want)
}

// filesEnding lists the files below a folder whose names end so, leaving out folders that begin with a dot.
func filesEnding(root, ending string) ([]string, error) {
	var files []string
	err := filepath.WalkDir(root, func(path string, entry fs.DirEntry, err error) error {
		if err != nil {
			return err
		}
		if entry.IsDir() && path != root && strings.HasPrefix(entry.Name(), ".") {
			return filepath.SkipDir
		}
		if !entry.IsDir() && strings.HasSuffix(path, ending) {
			files = append(files, path)
		}
		return nil
	})
	return files, err
}
