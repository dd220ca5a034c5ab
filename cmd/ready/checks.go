package main

import (
	"bytes"
	"context"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
)

func checkFormat(ctx context.Context) error {
	files, err := goFiles()
	if err != nil {
		return err
	}
	out, err := exec.CommandContext(ctx, "gofmt", append([]string{"-l"}, files...)...).CombinedOutput()
	if err != nil {
		return fmt.Errorf("gofmt: %w: %s", err, out)
	}
	if len(out) > 0 {
		return fmt.Errorf("gofmt -w these:\n%s", out)
	}
	return nil
}

// goFiles lists the Go files that people write.
func goFiles() ([]string, error) {
	var files []string
	err := filepath.WalkDir(".", func(path string, entry fs.DirEntry, err error) error {
		if err != nil {
			return err
		}
		if entry.IsDir() && path != "." && strings.HasPrefix(entry.Name(), ".") {
			return filepath.SkipDir
		}
		if strings.HasSuffix(path, ".go") && !strings.HasSuffix(path, "_templ.go") {
			files = append(files, path)
		}
		return nil
	})
	return files, err
}

func checkVet(ctx context.Context) error { return run(ctx, "go", "vet", "./...") }

func checkStatic(ctx context.Context) error { return run(ctx, "go", "tool", "staticcheck", "./...") }

// checkGenerated generates the templates again and compares.
func checkGenerated(ctx context.Context) error {
	before, err := generated()
	if err != nil {
		return err
	}
	out, err := exec.CommandContext(ctx, "go", "tool", "templ", "generate").CombinedOutput()
	if err != nil {
		return fmt.Errorf("templ generate: %w: %s", err, out)
	}
	after, err := generated()
	if err != nil {
		return err
	}
	var stale []string
	for name, text := range after {
		if !bytes.Equal(before[name], text) {
			stale = append(stale, name)
		}
	}
	if len(stale) > 0 {
		return fmt.Errorf("these were stale and are now generated; commit them: %s", strings.Join(stale, ", "))
	}
	return nil
}

func generated() (map[string][]byte, error) {
	texts := map[string][]byte{}
	err := filepath.WalkDir("web", func(path string, _ fs.DirEntry, err error) error {
		if err != nil || !strings.HasSuffix(path, "_templ.go") {
			return err
		}
		text, err := os.ReadFile(path)
		texts[path] = text
		return err
	})
	if err == nil && len(texts) == 0 {
		err = errors.New("no generated templates were found; run this in the folder of go.mod")
	}
	return texts, err
}
