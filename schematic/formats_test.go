package schematic_test

import (
	"bytes"
	"encoding/json"
	"errors"
	"flag"
	"io/fs"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"loopwright/schematic"
)

// formats holds files of the first version of the format, as they were when it was fixed. They must be read for ever.
// Files are added when kinds are; none that is there may change.
const formats = "../testdata/formats/v1"

var update = flag.Bool("update", false, "put down how new sheets of the first format are written; what is put down already stays")

func sheetsOf(t *testing.T, ending string) []string {
	t.Helper()
	names, err := filepath.Glob(filepath.Join(formats, "*"+ending))
	if err != nil || len(names) == 0 {
		t.Fatalf("no files %s in %s (%v)", ending, formats, err)
	}
	return names
}

func TestSheetsOfTheFirstFormatAreReadAndWrittenAsEver(t *testing.T) {
	for _, name := range sheetsOf(t, ".sheet.json") {
		data, err := os.ReadFile(name)
		if err != nil {
			t.Fatal(err)
		}
		sheet, err := schematic.Decode(data)
		if err != nil {
			t.Errorf("%s: %v", name, err)
			continue
		}
		golden := strings.TrimSuffix(name, ".sheet.json") + ".written.json"
		want, err := os.ReadFile(golden)
		if *update && errors.Is(err, fs.ErrNotExist) {
			want = schematic.Encode(sheet)
			err = os.WriteFile(golden, want, 0o644)
		}
		if err != nil {
			t.Fatal(err)
		}
		if got := schematic.Encode(sheet); !bytes.Equal(got, want) {
			t.Errorf("%s is written as\n%s\nwant\n%s", name, got, want)
		}
		if again, err := schematic.Decode(want); err != nil || !bytes.Equal(schematic.Encode(again), want) {
			t.Errorf("%s is not read as it was written (%v)", golden, err)
		}
	}
}

// history is a log as a store holds it, from an empty sheet on, and the sheet that it leads to.
type history struct {
	Changes []*schematic.Change `json:"changes"`
	Leads   string              `json:"leads_to"`
}

func TestChangesOfTheFirstFormatAreReplayedAsEver(t *testing.T) {
	for _, name := range sheetsOf(t, ".changes.json") {
		data, err := os.ReadFile(name)
		if err != nil {
			t.Fatal(err)
		}
		var past history
		if err := json.Unmarshal(data, &past); err != nil {
			t.Fatal(err)
		}
		sheet := schematic.New("Untitled")
		for i, change := range past.Changes {
			if sheet, err = schematic.Replay(sheet, change); err != nil {
				t.Fatalf("%s, change %d: %v", name, i, err)
			}
		}
		if got := string(schematic.Encode(sheet)); got != past.Leads {
			t.Errorf("%s leads to\n%s\nwant\n%s", name, got, past.Leads)
		}
		for i := len(past.Changes) - 1; i >= 0; i-- {
			if sheet, err = schematic.Replay(sheet, past.Changes[i].Inverse()); err != nil {
				t.Fatalf("%s, change %d back: %v", name, i, err)
			}
		}
		if !bytes.Equal(schematic.Encode(sheet), schematic.Encode(schematic.New("Untitled"))) {
			t.Errorf("%s does not lead back to an empty sheet: %s", name, schematic.Encode(sheet))
		}
	}
}
