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
	return &Problem{string(solver.Empty),
		"There is nothing to solve yet: no part on the sheet can carry a current. Put a supply and a load on it and join them.", []string{}}
}

// disagreement is the problem of a solution that its audit did not pass. Such a solution is not shown.
func disagreement(audit solver.Audit) *Problem {
	worst := max(audit.KCL, audit.KVL, audit.Power, audit.NodalGap)
	return &Problem{string(solver.Undetermined), fmt.Sprintf("The two methods differ by %.1e of the largest value, so that no "+
		"value can be relied on. Look for values that are very many powers of ten apart, and make them more alike.", worst), []string{}}
}

// inWords says a problem of the network in terms of the sheet.
func inWords(drawing *trace.Drawing, problem *solver.Problem) *Problem {
	refs := refsOf(drawing, problem.Branches)
	s := sentences{
		drawing: drawing, problem: problem, parts: listed(refs), several: len(refs) > 1,
		sum: quantity.Format(cmplx.Abs(problem.Sum), unitOf(problem), 4),
	}
	return &Problem{string(problem.Code), s.message(), refs}
}

// unitOf is the unit of what does not add up.
func unitOf(problem *solver.Problem) quantity.Unit {
	if problem.Loop != nil {
		return quantity.Volt
	}
	return quantity.Ampere
}

// sentences says what is wrong and what to do.
type sentences struct {
	drawing *trace.Drawing
	problem *solver.Problem
	parts   string // "-G1 and -G2"
	several bool
	sum     string // what does not add up, with its unit
}

func (s *sentences) message() string {
	switch s.problem.Code {
	case solver.ShortedSource:
		return s.shorted()
	case solver.SourceLoop:
		if len(s.problem.Branches) == 2 {
			return s.parts + " are joined without resistance and their voltages differ by " + s.sum +
				". Give one of them its inner resistance, or part them."
		}
		return s.parts + " form a loop without resistance whose voltages do not add up by " + s.sum +
			". Give one of them its inner resistance, or open the loop."
	case solver.NoReturnPath:
		return s.noReturn()
	case solver.Undetermined:
		return s.undetermined()
	case solver.ControlLoop:
		return s.parts + " control one another in such a way that no values fit, or any do. Change a gain, or what controls it."
	}
	return "The case has no unique solution; look at " + s.parts + "."
}

// shorted tells of a source and what shorts it.
func (s *sentences) shorted() string {
	var source string
	var shorts []int
	for _, step := range s.problem.Loop {
		if ref := s.drawing.Branches[step.Branch].Ref; s.drawing.Delivers(step.Branch) && source == "" {
			source = "-" + ref
		} else {
			shorts = append(shorts, step.Branch)
		}
	}
	if source == "" {
		source = "A source"
	}
	if len(shorts) == 0 {
		return source + " is shorted: its pins are one potential. Part the wires at its pins, or give it its inner resistance."
	}
	return source + " is shorted through " + listed(refsOf(s.drawing, shorts)) +
		" without any resistance. Put a load into the way, or give one of them its resistance."
}

// noReturn tells of sources whose current cannot flow.
func (s *sentences) noReturn() string {
	if s.several {
		return s.parts + " are in series and their currents differ by " + s.sum + ". Make them alike, or put a resistance beside one of them."
	}
	advice := " Put a resistance beside it, or join its pins through a load."
	if len(s.problem.Open) > 0 {
		open := refsOf(s.drawing, s.problem.Open)
		advice = " Close " + listed(open) + ", or put a resistance beside " + s.parts + "."
	}
	return "The current of " + s.parts + ", " + s.sum + ", has no way back." + advice
}

// undetermined tells what could have any value.
func (s *sentences) undetermined() string {
	switch {
	case s.problem.Loop != nil && s.several:
		return s.parts + " form a loop without any resistance, so that any current could flow around it. Give one of them its resistance."
	case s.problem.Loop != nil:
		return s.parts + " has no resistance and both its pins are one potential, so that any current could flow in it. " +
			"Give it its resistance, or part the wires at its pins."
	case len(s.problem.Branches) == 0:
		return "The equations have no unique solution. Look for values that are very many powers of ten apart, and make them more alike."
	case s.several:
		return "How the voltage divides between " + s.parts + " is not determined. Put a resistance beside one of them."
	}
	return "The voltage at " + s.parts + " is not determined. Put a resistance beside it."
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
