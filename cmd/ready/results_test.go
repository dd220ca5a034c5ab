package main

import (
	"slices"
	"strings"
	"testing"
)

func fold(lines ...string) (*results, string) {
	r := newResults()
	var printed strings.Builder
	for _, line := range lines {
		printed.WriteString(r.take([]byte(line)))
	}
	return r, printed.String()
}

func TestAPassingPackageIsOneClosingLine(t *testing.T) {
	r, printed := fold(
		`{"Action":"start","Package":"p"}`, `{"Action":"run","Package":"p","Test":"TestA"}`,
		`{"Action":"output","Package":"p","Test":"TestA","Output":"=== RUN   TestA\n"}`,
		`{"Action":"pass","Package":"p","Test":"TestA"}`,
		`{"Action":"output","Package":"p","Output":"PASS\n"}`,
		`{"Action":"output","Package":"p","Output":"ok  \tp\t0.1s\n"}`, `{"Action":"pass","Package":"p"}`)
	if printed != "ok  \tp\t0.1s\n" {
		t.Errorf("printed %q", printed)
	}
	if r.ran != 1 || len(r.failed)+len(r.skipped) != 0 {
		t.Errorf("counted %+v", r)
	}
}

func TestOfAFailingPackageOnlyTheFailingTestsArePrinted(t *testing.T) {
	r, printed := fold(
		`{"Action":"output","Package":"p","Test":"TestB","Output":"=== RUN   TestB\n"}`,
		`{"Action":"pass","Package":"p","Test":"TestB"}`,
		`{"Action":"output","Package":"p","Test":"TestA","Output":"    a_test.go:1: wrong\n"}`,
		`{"Action":"fail","Package":"p","Test":"TestA"}`,
		`{"Action":"output","Package":"p","Output":"FAIL\tp\t0.1s\n"}`, `{"Action":"fail","Package":"p"}`)
	if printed != "    a_test.go:1: wrong\nFAIL\tp\t0.1s\n" {
		t.Errorf("printed %q", printed)
	}
	if !slices.Equal(r.failed, []string{"p.TestA"}) {
		t.Errorf("failed %v", r.failed)
	}
}

func TestASkippedTestIsRemembered(t *testing.T) {
	r, _ := fold(`{"Action":"skip","Package":"p","Test":"TestA"}`, `{"Action":"skip","Package":"q"}`)
	if !slices.Equal(r.skipped, []string{"p.TestA"}) {
		t.Errorf("skipped %v", r.skipped)
	}
}

func TestWhatIsNoEventIsPrintedAsItIs(t *testing.T) {
	if _, printed := fold("# build failed"); printed != "# build failed\n" {
		t.Errorf("printed %q", printed)
	}
}
