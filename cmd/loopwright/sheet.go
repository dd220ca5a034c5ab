package main

import (
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"strings"

	"loopwright/schematic"
)

// readSheet reads a sheet file, or standard input when the name is "-". The error names the file, the place in it, and
// what to do.
func readSheet(s streams, name string) (*schematic.Sheet, error) {
	data, err := readFile(s, name)
	if err != nil {
		return nil, err
	}
	sheet, err := schematic.Decode(data)
	if err != nil {
		if name == "-" {
			name = "standard input"
		}
		return nil, fmt.Errorf("%s: %w", name, err)
	}
	return sheet, nil
}

func readFile(s streams, name string) ([]byte, error) {
	if name == "-" {
		return io.ReadAll(s.in)
	}
	data, err := os.ReadFile(name)
	var why *fs.PathError
	if errors.As(err, &why) {
		return nil, fmt.Errorf("%s cannot be read: %w; name a sheet file, or - for standard input", name, why.Err)
	}
	return data, err
}

// findCase gives the index of a case that a person named.
func findCase(sheet *schematic.Sheet, name string) (int, error) {
	if i := sheet.Case(name); i >= 0 {
		return i, nil
	}
	names := make([]string, len(sheet.Cases))
	for i := range sheet.Cases {
		names[i] = fmt.Sprintf("%q", sheet.Cases[i].Name)
	}
	return 0, fmt.Errorf("there is no case %q on the sheet; it has %s", name, strings.Join(names, ", "))
}
