package main

import (
	"context"
	"errors"
	"fmt"
	"maps"
	"os"
	"slices"
	"strings"
)

// generatedEnding is how the names of the files end that are made from templates.
const generatedEnding = "_templ.go"

// checkGenerated generates the templates again and compares. What was stale is up to date afterwards.
func checkGenerated(ctx context.Context) error {
	before, err := contents(generatedEnding)
	if err != nil {
		return err
	}
	if out, err := command(ctx, "go", "tool", "templ", "generate").CombinedOutput(); err != nil {
		os.Stdout.Write(out)
		return fmt.Errorf("templ generate: %w", err)
	}
	after, err := contents(generatedEnding)
	if err != nil {
		return err
	}
	if stale := different(before, after); len(stale) > 0 {
		return errors.New("commit what was stale and is generated now: " + strings.Join(stale, ", "))
	}
	return nil
}

// contents reads the files of the project whose names end so.
func contents(ending string) (map[string]string, error) {
	names, err := filesEnding(".", ending)
	if err != nil {
		return nil, err
	}
	texts := map[string]string{}
	for _, name := range names {
		text, err := os.ReadFile(name)
		if err != nil {
			return nil, err
		}
		texts[name] = string(text)
	}
	return texts, nil
}

// different names the files that are not in both, or not the same in both, in order.
func different(before, after map[string]string) []string {
	names := map[string]bool{}
	for name, text := range after {
		if old, had := before[name]; !had || old != text {
			names[name] = true
		}
	}
	for name := range before {
		if _, has := after[name]; !has {
			names[name] = true
		}
	}
	return slices.Sorted(maps.Keys(names))
}
