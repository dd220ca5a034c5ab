package main

import (
	"bufio"
	"slices"
	"strings"
	"testing"
)

// fold takes events as go test -json writes them, and gives what was counted and printed.
func fold(t *testing.T, lines ...string) (*results, string) {
	t.Helper()
	r := newResults()
	var printed strings.Builder
	if err := r.readAll(bufio.NewReader(strings.NewReader(strings.Join(lines, "\n"))), &printed); err != nil {
		t.Fatal(err)
	}
	return r, printed.String()
}

// verdictOf is the verdict in words, empty when all is well.
func verdictOf(r *results) string {
	if err := r.verdict(); err != nil {
		return err.Error()
	}
	return ""
}

func TestAPassingPackageIsOneClosingLine(t *testing.T) {
	r, printed := fold(t,
		`{"Action":"start","Package":"p"}`, `{"Action":"run","Package":"p","Test":"TestA"}`,
		`{"Action":"output","Package":"p","Test":"TestA","Output":"=== RUN   TestA\n"}`,
		`{"Action":"output","Package":"p","Test":"TestA","Output":"    a_test.go:1: all well\n"}`,
		`{"Action":"pass","Package":"p","Test":"TestA"}`,
		`{"Action":"output","Package":"p","Output":"PASS\n"}`,
		`{"Action":"output","Package":"p","Output":"ok  \tp\t0.1s\n"}`, `{"Action":"pass","Package":"p"}`)
	if printed != "ok  \tp\t0.1s\n" {
		t.Errorf("printed %q", printed)
	}
	if r.ran != 1 || verdictOf(r) != "" {
		t.Errorf("counted %d; %s", r.ran, verdictOf(r))
	}
}

func TestOfAFailingPackageOnlyTheFailingTestsArePrinted(t *testing.T) {
	r, printed := fold(t,
		`{"Action":"output","Package":"p","Test":"TestB","Output":"=== RUN   TestB\n"}`,
		`{"Action":"pass","Package":"p","Test":"TestB"}`,
		`{"Action":"output","Package":"p","Test":"TestA","Output":"    a_test.go:1: wrong\n"}`,
		`{"Action":"fail","Package":"p","Test":"TestA"}`,
		`{"Action":"output","Package":"p","Output":"FAIL\tp\t0.1s\n"}`, `{"Action":"fail","Package":"p"}`)
	if printed != "    a_test.go:1: wrong\nFAIL\tp\t0.1s\n" {
		t.Errorf("printed %q", printed)
	}
	if got := verdictOf(r); got != "failed: p.TestA" {
		t.Error(got)
	}
}

func TestASkippedTestIsAFailureThatSaysWhy(t *testing.T) {
	r, printed := fold(t,
		`{"Action":"output","Package":"p","Test":"TestA","Output":"    a_test.go:1: needs a moon\n"}`,
		`{"Action":"skip","Package":"p","Test":"TestA"}`, `{"Action":"pass","Package":"p","Test":"TestB"}`,
		`{"Action":"output","Package":"q","Output":"?   \tq\t[no test files]\n"}`, `{"Action":"skip","Package":"q"}`)
	if got := verdictOf(r); got != "skipped: p.TestA" {
		t.Error(got)
	}
	if printed != "    a_test.go:1: needs a moon\n?   \tq\t[no test files]\n" {
		t.Errorf("printed %q", printed)
	}
}

func TestATestThatHangsIsShownWithItsTrace(t *testing.T) {
	r, printed := fold(t,
		`{"Action":"output","Package":"p","Test":"TestWaits","Output":"=== RUN   TestWaits\n"}`,
		`{"Action":"output","Package":"p","Test":"TestWaits","Output":"=== PAUSE TestWaits\n"}`,
		`{"Action":"output","Package":"p","Test":"TestHangs","Output":"=== RUN   TestHangs\n"}`,
		`{"Action":"output","Package":"q","Test":"TestRuns","Output":"=== RUN   TestRuns\n"}`,
		`{"Action":"output","Package":"p","Test":"TestHangs","Output":"panic: test timed out after 2s\n"}`,
		`{"Action":"output","Package":"p","Output":"FAIL\tp\t2.0s\n"}`, `{"Action":"fail","Package":"p"}`,
		`{"Action":"pass","Package":"q","Test":"TestRuns"}`)
	if printed != "=== RUN   TestHangs\npanic: test timed out after 2s\nFAIL\tp\t2.0s\n" {
		t.Errorf("printed %q", printed)
	}
	if got := verdictOf(r); got != "failed: p (a test did not end)" {
		t.Error(got)
	}
}

func TestAPackageThatDoesNotBuildIsAFailure(t *testing.T) {
	r, printed := fold(t,
		`{"ImportPath":"p [p.test]","Action":"build-output","Output":"a_test.go:3:28: undefined: y\n"}`,
		`{"ImportPath":"p [p.test]","Action":"build-fail"}`,
		`{"Action":"output","Package":"p","Output":"FAIL\tp [build failed]\n"}`,
		`{"Action":"fail","Package":"p","FailedBuild":"p [p.test]"}`)
	if printed != "a_test.go:3:28: undefined: y\nFAIL\tp [build failed]\n" {
		t.Errorf("printed %q", printed)
	}
	if got := verdictOf(r); got != "failed: p" {
		t.Error(got)
	}
}

func TestAPackageIsNotTakenForAnotherThatBeginsAlike(t *testing.T) {
	r, _ := fold(t,
		`{"Action":"fail","Package":"pq","Test":"TestA"}`, `{"Action":"fail","Package":"pq"}`, `{"Action":"fail","Package":"p"}`)
	if want := []string{"pq.TestA", "p"}; !slices.Equal(r.failed, want) {
		t.Errorf("failed %v, want %v", r.failed, want)
	}
}

func TestNoTestAtAllIsAFailure(t *testing.T) {
	r, _ := fold(t, `{"Action":"skip","Package":"q"}`)
	if got := verdictOf(r); got != "no test ran" {
		t.Error(got)
	}
}

func TestWhatIsNoEventIsPrintedAsItIs(t *testing.T) {
	if _, printed := fold(t, "go: something is wrong", "and so is this"); printed != "go: something is wrong\nand so is this\n" {
		t.Errorf("printed %q", printed)
	}
}

func TestALineMayBeVeryLong(t *testing.T) {
	long := strings.Repeat("x", 1<<20)
	_, printed := fold(t, `{"Action":"output","Package":"p","Test":"TestA","Output":"`+long+`\n"}`, `{"Action":"fail","Package":"p","Test":"TestA"}`)
	if printed != long+"\n" {
		t.Errorf("printed %d bytes", len(printed))
	}
}
