package store

import (
	"context"
	"encoding/json"
	"errors"
	"fmt"
	"path/filepath"
	"reflect"
	"slices"
	"strings"
	"sync"
	"testing"

	"github.com/google/uuid"

	"loopwright/schematic"
	"loopwright/schematic/kinds"
)

// fresh opens a store that holds one sheet without parts.
func fresh(t testing.TB) (*Store, ID, string) {
	t.Helper()
	s := open(t, filepath.Join(t.TempDir(), "sheets.db"))
	id, key, revision, err := s.Create(context.Background(), schematic.New("Pump"))
	if err != nil || revision != 1 {
		t.Fatalf("creating a sheet gives revision %d and error %v, want 1 and none", revision, err)
	}
	return s, id, key
}

// number makes a UUID of a number.
func number(n int) uuid.UUID { return uuid.NewSHA1(uuid.NameSpaceOID, fmt.Append(nil, n)) }

// batch makes a batch of edits that are given as JSON.
func batch(t testing.TB, n int, author string, edits ...string) Batch {
	t.Helper()
	record := []byte("[" + strings.Join(edits, ",") + "]")
	decoded, err := schematic.DecodeEdits(record)
	if err != nil {
		t.Fatal(err)
	}
	return Batch{ID: number(n), Base: 1, Author: author, Edits: decoded, Record: record}
}

func add(n int) string {
	return fmt.Sprintf(`{"do": "add", "part": {"ref": "R%d", "kind": "resistor", "at": [%d, 10]}}`, n, 4*n)
}

func remove(n int) string { return fmt.Sprintf(`{"do": "remove", "refs": ["R%d"]}`, n) }

const undo, redo = `{"do": "undo"}`, `{"do": "redo"}`

// commit applies a batch that must be accepted, and gives the revision.
func commit(t testing.TB, s *Store, id ID, b Batch) int {
	t.Helper()
	answer, err := s.Commit(context.Background(), id, b)
	if err != nil {
		t.Fatalf("batch %s: %v", b.Record, err)
	}
	return answer.Revision
}

// refs lists the parts of the sheet at its newest revision.
func refs(t testing.TB, s *Store, id ID) string {
	t.Helper()
	sheet, _, err := s.Sheet(context.Background(), id)
	if err != nil {
		t.Fatal(err)
	}
	return refsOf(sheet)
}

func refsOf(sheet *schematic.Sheet) string {
	var all []string
	for _, part := range sheet.Parts {
		all = append(all, part.Ref)
	}
	return strings.Join(all, " ")
}

// rebuilt gives the parts as the database alone has them.
func rebuilt(t testing.TB, s *Store, id ID, revision int) string {
	t.Helper()
	sheet, err := load(context.Background(), s.reads, id, revision)
	if err != nil {
		t.Fatal(err)
	}
	return refsOf(sheet)
}

// sorted puts words in order.
func sorted(words string) string {
	list := strings.Fields(words)
	slices.Sort(list)
	return strings.Join(list, " ")
}

func TestEverybodyUndoesHisOwn(t *testing.T) {
	s, id, _ := fresh(t)
	for i, step := range []struct {
		author   string
		edits    []string
		revision int // 0: a conflict
		refs     string
	}{
		{"ann", []string{undo}, 0, ""},
		{"ann", []string{add(1)}, 2, "R1"},
		{"ben", []string{add(2)}, 3, "R1 R2"},
		{"ann", []string{add(3)}, 4, "R1 R2 R3"},
		{"ben", []string{undo}, 5, "R1 R3"},
		{"ann", []string{undo}, 6, "R1"},
		{"ann", []string{undo}, 7, ""},
		{"ann", []string{undo}, 0, ""},
		{"ben", []string{redo}, 8, "R2"},
		{"ben", []string{redo}, 0, "R2"},
		{"ann", []string{redo}, 9, "R2 R1"},
		{"ann", []string{add(4)}, 10, "R2 R1 R4"},
		{"ann", []string{redo}, 0, "R2 R1 R4"}, // a new edit ends what could be redone
		{"ben", []string{remove(4)}, 11, "R2 R1"},
		{"ann", []string{undo}, 0, "R2 R1"}, // what ann would undo is not there any more
		{"ben", []string{undo, undo}, 13, "R1 R4"},
		{"ann", []string{add(5), undo, undo, add(6)}, 17, "R1 R6"},
		{"ann", []string{add(7), remove(9)}, 0, "R1 R6"},
	} {
		answer, err := s.Commit(context.Background(), id, batch(t, i, step.author, step.edits...))
		var conflict *schematic.ConflictError
		switch {
		case step.revision == 0 && !errors.As(err, &conflict):
			t.Fatalf("step %d: error is %v, want a conflict", i, err)
		case step.revision > 0 && (err != nil || answer.Revision != step.revision):
			t.Fatalf("step %d: revision %d, error %v; want revision %d", i, answer.Revision, err, step.revision)
		}
		if got := refs(t, s, id); sorted(got) != sorted(step.refs) {
			t.Fatalf("step %d: the sheet holds %q, want %q", i, got, step.refs)
		}
		_, newest, _ := s.Sheet(context.Background(), id)
		if got := rebuilt(t, s, id, newest); got != refs(t, s, id) {
			t.Fatalf("step %d: the database holds %q, memory holds %q", i, got, refs(t, s, id))
		}
		if step.revision == 0 && answer.Revision != newest {
			t.Errorf("step %d: the conflict comes with revision %d, want %d", i, answer.Revision, newest)
		}
	}
}

func TestABatchThatComesAgainIsAnsweredAgainAndNotApplied(t *testing.T) {
	s, id, _ := fresh(t)
	first := batch(t, 1, "ann", `{"do": "add", "part": {"kind": "resistor", "at": [4, 10]}}`)
	want, err := s.Commit(context.Background(), id, first)
	if err != nil {
		t.Fatal(err)
	}
	commit(t, s, id, batch(t, 2, "ann", add(7)))
	before := refs(t, s, id)
	got, err := s.Commit(context.Background(), id, first)
	if err != nil || !reflect.DeepEqual(got, want) {
		t.Errorf("the second answer is %v, %v; the first was %v", got, err, want)
	}
	if after := refs(t, s, id); after != before {
		t.Errorf("the sheet holds %q after the repetition, %q before", after, before)
	}
	other, _, _, err := s.Create(context.Background(), schematic.New("Fan"))
	if err != nil {
		t.Fatal(err)
	}
	if commit(t, s, other, first); refs(t, s, other) != want.Made.Refs[0] {
		t.Error("a batch of the same id on another sheet is another batch")
	}
}

func TestABatchOnARevisionToComeIsAConflict(t *testing.T) {
	s, id, _ := fresh(t)
	b := batch(t, 1, "ann", add(1))
	b.Base = 2
	answer, err := s.Commit(context.Background(), id, b)
	if conflict := (*schematic.ConflictError)(nil); !errors.As(err, &conflict) || answer.Revision != 1 {
		t.Errorf("answer %v, error %v; want a conflict with revision 1", answer, err)
	}
}

func TestASheetIsRebuiltFromSnapshotsAndChangesAtEveryRevision(t *testing.T) {
	s, id, _ := fresh(t)
	want := map[int]string{1: ""}
	for n := 1; n <= 130; n++ {
		edits := []string{add(n)}
		if n%7 == 0 {
			edits = append(edits, undo, add(1000+n)) // several revisions in one batch
		}
		revision := commit(t, s, id, batch(t, n, "ann", edits...))
		want[revision] = refs(t, s, id)
	}
	for revision, parts := range want {
		sheet, err := s.At(context.Background(), id, revision)
		if err != nil {
			t.Fatal(err)
		}
		if got := refsOf(sheet); got != parts {
			t.Fatalf("revision %d holds %q, want %q", revision, got, parts)
		}
	}
	var snapshots int
	if err := s.reads.QueryRow("SELECT count(*) FROM snapshots").Scan(&snapshots); err != nil {
		t.Fatal(err)
	}
	if last := 130 + 2*(130/7); snapshots != 1+last/between {
		t.Errorf("there are %d snapshots of %d revisions", snapshots, last)
	}
	for _, revision := range []int{-1, 0, 1000} {
		if _, err := s.At(context.Background(), id, revision); !errors.Is(err, ErrNotFound) {
			t.Errorf("revision %d gives error %v, want not found", revision, err)
		}
	}
}

func TestTheLogTellsWhatHappenedSinceARevision(t *testing.T) {
	s, id, _ := fresh(t)
	commit(t, s, id, batch(t, 1, "ann", add(1)))
	commit(t, s, id, batch(t, 2, "ben", add(2), undo))
	entries, err := s.Changes(context.Background(), id, 2)
	if err != nil {
		t.Fatal(err)
	}
	var got []string
	for _, e := range entries {
		got = append(got, fmt.Sprint(e.Revision, " ", e.Author, " ", e.Do, " ", e.Of, " ", e.Change.Empty()))
	}
	if want := []string{"3 ben edit 0 false", "4 ben undo 3 false"}; !reflect.DeepEqual(got, want) {
		t.Errorf("the log says %q, want %q", got, want)
	}
}

func TestUndoWorksAfterTheStoreHasBeenOpenedAgain(t *testing.T) {
	name := filepath.Join(t.TempDir(), "again.db")
	s, err := Open(context.Background(), name)
	if err != nil {
		t.Fatal(err)
	}
	id, _, _, err := s.Create(context.Background(), schematic.New("Pump"))
	if err != nil {
		t.Fatal(err)
	}
	commit(t, s, id, batch(t, 1, "ann", add(1)))
	commit(t, s, id, batch(t, 2, "ann", add(2)))
	commit(t, s, id, batch(t, 3, "ann", undo))
	if err := s.Close(); err != nil {
		t.Fatal(err)
	}
	if _, err := s.Commit(context.Background(), id, batch(t, 4, "ann", undo)); err == nil {
		t.Error("a store that is closed has taken an edit")
	}
	again := open(t, name)
	commit(t, again, id, batch(t, 4, "ann", undo))
	if got := refs(t, again, id); got != "" {
		t.Errorf("the sheet holds %q, want nothing", got)
	}
	commit(t, again, id, batch(t, 5, "ann", redo, redo))
	if got := refs(t, again, id); sorted(got) != "R1 R2" {
		t.Errorf("the sheet holds %q, want R1 and R2", got)
	}
}

func TestASheetThatIsTooLargeIsRefused(t *testing.T) {
	resistor, err := kinds.Lookup("resistor")
	if err != nil {
		t.Fatal(err)
	}
	sheet := schematic.New("Marshalling cabinet")
	for n := range mostParts {
		sheet.Parts = append(sheet.Parts, schematic.Part{Ref: fmt.Sprint("R", n), Kind: resistor, At: schematic.Point{X: 4 * (n % 100), Y: 6 * (n / 100)}})
	}
	s := open(t, filepath.Join(t.TempDir(), "large.db"))
	id, _, _, err := s.Create(context.Background(), sheet)
	if err != nil {
		t.Fatalf("a sheet of %d parts is refused: %v", mostParts, err)
	}
	_, err = s.Commit(context.Background(), id, batch(t, 1, "ann", `{"do": "add", "part": {"ref": "R9999", "kind": "resistor", "at": [2, 2]}}`))
	var place *schematic.PlaceError
	if !errors.As(err, &place) || place.Place != "parts" {
		t.Errorf("part %d gives error %v, want it refused", mostParts+1, err)
	}
	if commit(t, s, id, batch(t, 2, "ann", remove(0))) != 2 {
		t.Error("a full sheet takes no edits any more")
	}
	sheet.Parts = append(sheet.Parts, schematic.Part{Ref: "R9999", Kind: resistor})
	if _, _, _, err := s.Create(context.Background(), sheet); !errors.As(err, &place) || place.Place != "parts" {
		t.Errorf("creating a sheet of %d parts gives error %v, want it refused", mostParts+1, err)
	}
	var many []string
	for range mostEdits + 1 {
		many = append(many, `{"do": "turn", "refs": ["R1"]}`)
	}
	if _, err := s.Commit(context.Background(), id, batch(t, 3, "ann", many...)); !errors.As(err, &place) || place.Place != "edits" {
		t.Errorf("a batch of %d edits gives error %v, want it refused", mostEdits+1, err)
	}
}

// Many send at once, so that batches share transactions; what is refused or fails must not touch the others.
func TestBatchesThatAreRefusedOrFailLeaveTheOthersAlone(t *testing.T) {
	s, id, _ := fresh(t)
	var wait sync.WaitGroup
	for n := range 200 {
		wait.Go(func() {
			switch {
			case n%10 == 3:
				if _, err := s.Commit(context.Background(), id, batch(t, n, "ann", remove(5000))); err == nil {
					t.Error("removing what is not there was accepted")
				}
			case n%10 == 5:
				err := s.do(context.Background(), func(g *group) error {
					g.exec("DELETE FROM log")
					panic("out of order")
				})
				if err == nil || !strings.Contains(err.Error(), "out of order") {
					t.Errorf("a job that panics gives error %v", err)
				}
			default:
				commit(t, s, id, batch(t, n, "ann", add(n)))
			}
		})
	}
	wait.Wait()
	sheet, revision, err := s.Sheet(context.Background(), id)
	if err != nil {
		t.Fatal(err)
	}
	if len(sheet.Parts) != 160 || revision != 161 {
		t.Errorf("the sheet has %d parts at revision %d, want 160 at 161", len(sheet.Parts), revision)
	}
	if got := rebuilt(t, s, id, revision); got != refsOf(sheet) {
		t.Errorf("the database holds %q, memory %q", got, refsOf(sheet))
	}
}

func TestAStateInMemoryThatIsOutOfDateIsNotUsed(t *testing.T) {
	s, id, _ := fresh(t)
	old, _ := s.sheets.Get(id)
	if old == nil {
		if _, _, err := s.Sheet(context.Background(), id); err != nil {
			t.Fatal(err)
		}
		old, _ = s.sheets.Get(id)
	}
	commit(t, s, id, batch(t, 1, "ann", add(1)))
	s.sheets.Put(id, old, 1)
	if got := refs(t, s, id); got != "R1" {
		t.Errorf("the sheet holds %q, want R1", got)
	}
	s.sheets.Put(id, old, 1)
	commit(t, s, id, batch(t, 2, "ann", add(2)))
	if got := refs(t, s, id); got != "R1 R2" {
		t.Errorf("the sheet holds %q, want R1 and R2", got)
	}
}

func TestTwoStoresMayShareADatabase(t *testing.T) {
	name := filepath.Join(t.TempDir(), "shared.db")
	first, second := open(t, name), open(t, name)
	id, _, _, err := first.Create(context.Background(), schematic.New("Pump"))
	if err != nil {
		t.Fatal(err)
	}
	var wait sync.WaitGroup
	for i, s := range []*Store{first, second, first, second} {
		wait.Go(func() {
			for n := range 25 {
				commit(t, s, id, batch(t, 25*i+n, "ann", add(25*i+n)))
			}
		})
	}
	wait.Wait()
	if got := refs(t, first, id); got != refs(t, second, id) || len(strings.Fields(got)) != 100 {
		t.Errorf("the sheet holds %q and %q", got, refs(t, second, id))
	}
	commit(t, second, id, batch(t, 101, "ann", undo, undo))
	if _, revision, _ := first.Sheet(context.Background(), id); revision != 103 {
		t.Errorf("the sheet is at revision %d, want 103", revision)
	}
}

func TestAnAnswerListsWhatItMade(t *testing.T) {
	s, id, _ := fresh(t)
	answer, err := s.Commit(context.Background(), id, batch(t, 1, "ann", add(4)))
	if err != nil {
		t.Fatal(err)
	}
	got, err := json.Marshal(answer)
	if err != nil {
		t.Fatal(err)
	}
	if want := `{"revision":2,"made":{"refs":["R4"],"wires":[],"joined":[]}}`; string(got) != want {
		t.Errorf("the answer is %s, want %s", got, want)
	}
}

func TestSubscribersHearOfTheNewestRevision(t *testing.T) {
	s, id, _ := fresh(t)
	revisions, cancel := s.Subscribe(id)
	other, cancelOther := s.Subscribe(id + 1)
	commit(t, s, id, batch(t, 1, "ann", add(1)))
	if got := <-revisions; got != 2 {
		t.Errorf("revision %d, want 2", got)
	}
	for n := 2; n <= 5; n++ {
		commit(t, s, id, batch(t, n, "ann", add(n)))
	}
	if got := <-revisions; got != 6 {
		t.Errorf("who reads slowly gets revision %d, want 6", got)
	}
	cancel()
	cancelOther()
	commit(t, s, id, batch(t, 6, "ann", add(6)))
	select {
	case got := <-revisions:
		t.Errorf("revision %d came after the end of the subscription", got)
	case got := <-other:
		t.Errorf("revision %d of another sheet came", got)
	default:
	}
	if len(s.notices.listeners) != 0 {
		t.Errorf("%d sheets still have listeners", len(s.notices.listeners))
	}
}
