package main

import (
	"context"
	"errors"
	"slices"
	"strings"
	"testing"
)

func passes(context.Context) error { return nil }

func TestTheFirstStepThatFailsEndsTheRunAndIsNamed(t *testing.T) {
	var printed strings.Builder
	passed := runSteps(t.Context(), &printed, []step{
		{"one", "one holds", passes},
		{"two", "two holds", func(context.Context) error { return errors.New("it does not") }},
		{"three", "three holds", func(context.Context) error { t.Error("three ran"); return nil }},
	})
	if passed {
		t.Error("passed")
	}
	lines := strings.Split(strings.TrimSpace(printed.String()), "\n")
	if want := "NOT READY: two: it does not; run it alone with: go run ./cmd/ready -only two"; lines[len(lines)-1] != want {
		t.Errorf("ends with %q, want %q", lines[len(lines)-1], want)
	}
	if !slices.Contains(lines, "== one: one holds") || strings.Contains(printed.String(), "three") {
		t.Errorf("printed\n%s", printed.String())
	}
}

func TestOnlyAllStepsTogetherMakeTheProjectReady(t *testing.T) {
	all := slices.Clone(steps)
	for i := range all {
		all[i].run = passes
	}
	for _, chosen := range [][]step{all, all[:1]} {
		var printed strings.Builder
		if !runSteps(t.Context(), &printed, chosen) {
			t.Error("did not pass")
		}
		if got, want := strings.HasSuffix(printed.String(), "\nREADY\n"), len(chosen) == len(all); got != want {
			t.Errorf("%d steps print\n%s", len(chosen), printed.String())
		}
		for _, s := range chosen {
			if strings.Count(printed.String(), s.name+" ") == 0 {
				t.Errorf("the summary leaves out %s", s.name)
			}
		}
	}
}

func TestTheFlagsChooseTheSteps(t *testing.T) {
	for _, c := range []struct {
		only  string
		bench bool
		want  string
		err   string
	}{
		{"", false, names(steps), ""},
		{"vet", false, "vet", ""},
		{"", true, "bench", ""},
		{"moon", false, "", `there is no step "moon"; there are ` + names(steps)},
		{"vet", true, "", "-bench runs no step; leave out -only vet"},
	} {
		chosen, err := choose(c.only, c.bench)
		said := ""
		if err != nil {
			said = err.Error()
		}
		if names(chosen) != c.want || said != c.err {
			t.Errorf("-only %q -bench=%t: %q, %q", c.only, c.bench, names(chosen), said)
		}
	}
}

func TestAStepThatFailsSaysHowToRunItAlone(t *testing.T) {
	for _, s := range append(slices.Clone(steps), benchmarks) {
		flags := strings.Fields(alone(s))
		only := ""
		if len(flags) == 2 {
			only = flags[1]
		}
		chosen, err := choose(only, flags[0] == "-bench")
		if err != nil || len(chosen) != 1 || chosen[0].name != s.name {
			t.Errorf("%s is not run by %v (%v)", s.name, flags, err)
		}
	}
}
