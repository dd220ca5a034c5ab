package solver

// findProblem looks for what makes the network unsolvable in its graph alone: loops of ideal voltage sources, cut sets of
// current sources, and controls that read a voltage that is not defined. It gives nil when there is nothing of the kind.
func findProblem[T Scalar](n *Network[T], laws []Law[T], split *pieces) *Problem {
	if len(n.Branches) == 0 {
		return &Problem{Code: Empty}
	}
	loops := newIdealGraph(n, laws)
	if problem := loops.shorted(); problem != nil {
		return problem
	}
	if problem := loops.conflict(); problem != nil {
		return problem
	}
	cuts := newCutGraph(n, laws)
	if problem := cuts.conflict(); problem != nil {
		return problem
	}
	if problem := loops.undetermined(); problem != nil {
		return problem
	}
	if problem := cuts.undetermined(); problem != nil {
		return problem
	}
	for b := range laws {
		for _, term := range laws[b].Terms {
			if term.Beta != 0 && split.cut[term.Branch] {
				return &Problem{Code: Undetermined, Branches: sortedUnique([]int{b, term.Branch})}
			}
		}
	}
	return nil
}

// balanced reports whether a sum is no more than the rounding of its terms, whose magnitudes sum to total.
func balanced[T Scalar](sum T, total float64) bool { return magnitude(sum) <= 16*epsilon*total }
