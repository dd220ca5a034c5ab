package cases

import (
	"fmt"
	"math/cmplx"
	"slices"

	"loopwright/schematic/quantity"
	"loopwright/schematic/trace"
	"loopwright/solver"
)

// Problem says why a case has no solution, in a sentence that says what to do, and which parts are at fault.
type Problem struct {
	Code    string   `json:"code"`
	Message string   `json:"message"`
	Parts   []string `json:"parts"`
}

func nothingToSolve() *Problem {
	return &Problem{string(solver.Empty), "There is nothing to solve yet: no part on the sheet can carry a current.", []string{}}
}

// disagreement is the problem of a solution that its audit did not pass. Such a solution is not shown.
func disagreement(drawing *trace.Drawing, audit solver.Audit) *Problem {
	worst := max(audit.KCL, audit.KVL, audit.Power, audit.NodalGap)
	return &Problem{string(solver.Undetermined),
		fmt.Sprintf("The two methods differ by %.1e of the largest value, so no values are shown. Look for values that are many powers of ten apart.", worst),
		refsOf(drawing, nil)}
}

// inWords says a problem of the network in terms of the sheet.
func inWords(drawing *trace.Drawing, problem *solver.Problem) *Problem {
	refs := refsOf(drawing, problem.Branches)
	return &Problem{string(problem.Code), sentence(problem, listed(refs), listed(refsOf(drawing, problem.Open))), refs}
}

func sentence(problem *solver.Problem, parts, open string) string {
	single := len(problem.Branches) == 1
	switch problem.Code {
	case solver.ShortedSource:
		return fmt.Sprintf("A source is shorted: %s closed on %s without any resistance. Part them, or give the source its inner resistance.", parts, itself(single))
	case solver.SourceLoop:
		return fmt.Sprintf("%s form a loop without resistance in which %s do not add up. Give one of them its inner resistance, or part them.",
			parts, quantity.Format(cmplx.Abs(problem.Sum), quantity.Volt, 4))
	case solver.NoReturnPath:
		return fmt.Sprintf("The current of %s has no way back. Close a path for it%s, or take the source out.", parts, among(open))
	case solver.ControlLoop:
		return fmt.Sprintf("%s control one another so that no values fit, or any do. Change a gain, or what controls it.", parts)
	case solver.Undetermined:
		if problem.Loop != nil && single {
			return fmt.Sprintf("%s is closed on itself without any resistance, so that its current can be anything. Give it a resistance, or part its ends.", parts)
		}
		if problem.Loop != nil {
			return fmt.Sprintf("%s form a loop without any resistance, so that the current in it can be anything. Give one of them a resistance.", parts)
		}
		return fmt.Sprintf("The voltage at %s can be anything. Put a resistance beside one of them%s.", parts, among(open))
	}
	return fmt.Sprintf("The case has no unique solution; look at %s.", parts)
}

func itself(single bool) string {
	if single {
		return "itself"
	}
	return "one another"
}

func among(open string) string {
	if open == "" {
		return ""
	}
	return ", for instance through " + open
}

// refsOf names the parts of branches, each once, in the order of the sheet.
func refsOf(drawing *trace.Drawing, branches []int) []string {
	refs := []string{}
	for _, b := range branches {
		if ref := drawing.Branches[b].Ref; !slices.Contains(refs, ref) {
			refs = append(refs, ref)
		}
	}
	return refs
}

// listed joins references as a sentence does: "-G1, -G2 and -R1".
func listed(refs []string) string {
	text := ""
	for i, ref := range refs {
		switch {
		case i == 0:
		case i == len(refs)-1:
			text += " and "
		default:
			text += ", "
		}
		text += "-" + ref
	}
	return text
}
