package solver

import "fmt"

// Code says in one word why a network has no unique solution.
type Code string

// The codes. NoOperatingPoint and Chatter come from those who solve a network repeatedly; Solve never gives them.
const (
	ShortedSource    Code = "shorted-source"     // zero resistance joins both ends of a source
	SourceLoop       Code = "source-loop"        // a loop of sources without resistance that do not agree
	NoReturnPath     Code = "no-return-path"     // a current source whose current cannot flow back
	Undetermined     Code = "undetermined"       // some currents or voltages can be anything
	ControlLoop      Code = "control-loop"       // controlled sources that contradict or feed only themselves
	NoOperatingPoint Code = "no-operating-point" // no point found at which all characteristics are met
	Chatter          Code = "chatter"            // contacts and coils that never come to rest
	Empty            Code = "empty"              // no branch at all
)

// Problem is the error of a network that has no unique solution, with the facts that a sentence about it needs.
type Problem struct {
	Code     Code
	Branches []int  // the smallest set found that is at fault, ascending
	Loop     []Step // for a loop of ideal voltage sources: the loop, in order
	Open     []int  // for a cut set: open branches in it; closing one may give the current a way back

	// Sum is what does not add up: the voltages around Loop in volts, or the current that Branches drive into the part
	// of the network that has no way back, in amperes. It is 0 where nothing conflicts but something is undetermined.
	Sum complex128
}

// Error names the code and the branches by their index; those who know the drawing say it in its own words.
func (p *Problem) Error() string {
	if len(p.Branches) == 0 {
		return "the network has no unique solution: " + string(p.Code)
	}
	return fmt.Sprintf("the network has no unique solution: %s in branches %v", p.Code, p.Branches)
}
