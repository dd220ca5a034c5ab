package solver_test

import (
	"context"
	"errors"
	"math/rand/v2"
	"slices"
	"testing"

	"loopwright/solver"
	"loopwright/solver/solvertest"
)

// part is a branch in short: its nodes and its law.
type part = solver.Branch[float64]

func emf(from, to int, volts float64) part {
	return part{From: from, To: to, Law: solver.VoltageSource(volts)}
}
func wire(from, to int) part { return part{From: from, To: to, Law: solver.Impedance[float64](0, 0)} }
func drive(from, to int, amperes float64) part {
	return part{From: from, To: to, Law: solver.CurrentSource(amperes)}
}
func ohms(from, to int, value float64) part {
	return part{From: from, To: to, Law: solver.Impedance(value, 0)}
}
func open(from, to int) part { return part{From: from, To: to, Law: solver.Open[float64]()} }

// vcvs sets its voltage to gain times that of another branch; vccs and cccs their current.
func vcvs(from, to, of int, gain float64) part {
	return part{From: from, To: to, Law: solver.Law[float64]{Beta: 1, Terms: []solver.Term[float64]{{Branch: of, Beta: -gain}}}}
}
func vccs(from, to, of int, gain float64) part {
	return part{From: from, To: to, Law: solver.Law[float64]{Alpha: 1, Terms: []solver.Term[float64]{{Branch: of, Beta: -gain}}}}
}

// network joins parts between as many nodes as they name.
func network(parts ...part) *solver.Network[float64] {
	n := &solver.Network[float64]{Branches: parts}
	for _, p := range parts {
		n.Nodes = max(n.Nodes, p.From+1, p.To+1)
	}
	n.Meshes = solver.FundamentalLoops(n.Nodes, n.Branches)
	return n
}

// The codes, and which case belongs to which, are common practice in circuit theory; the equations of each network can be
// checked by hand.
func TestProblemsNameTheSmallestSetAtFault(t *testing.T) {
	cases := []struct {
		name     string
		parts    []part
		code     solver.Code
		branches []int
		sum      complex128
		open     []int
		mend     func([]part) []part // what makes it solvable
	}{
		{name: "nothing drawn", code: solver.Empty, mend: func([]part) []part { return []part{ohms(0, 1, 1)} }},
		{
			name:  "a source shorted by one wire, beside a longer loop",
			parts: []part{ohms(0, 1, 5), emf(1, 0, 24), wire(1, 2), wire(2, 0), wire(1, 0)},
			code:  solver.ShortedSource, branches: []int{1, 4}, sum: 24,
			mend: func(p []part) []part { return slices.Delete(p, 3, 5) },
		},
		{
			name:  "a source whose pins are one node",
			parts: []part{emf(0, 0, 5), ohms(0, 1, 1)},
			code:  solver.ShortedSource, branches: []int{0}, sum: 5,
			mend: func(p []part) []part { return p[1:] },
		},
		{
			name:  "a shorted source is told before sources that disagree",
			parts: []part{emf(1, 0, 24), emf(1, 0, 12), wire(1, 0)},
			code:  solver.ShortedSource, branches: []int{0, 2}, sum: 24,
			mend: func(p []part) []part { return p[:1] },
		},
		{
			name:  "two sources in parallel that disagree",
			parts: []part{emf(1, 0, 24), ohms(1, 0, 10), emf(1, 0, 12)},
			code:  solver.SourceLoop, branches: []int{0, 2}, sum: 12,
			mend: func(p []part) []part { return p[:2] },
		},
		{
			name:  "sources around a triangle, where two more agree",
			parts: []part{emf(1, 0, 5), emf(2, 1, 5), emf(2, 0, 9), emf(1, 0, 5)},
			code:  solver.SourceLoop, branches: []int{0, 1, 2}, sum: 1,
			mend: func(p []part) []part { return p[:2] },
		},
		{
			name:  "two equal sources in parallel",
			parts: []part{emf(1, 0, 24), emf(0, 1, -24), ohms(1, 0, 10)},
			code:  solver.Undetermined, branches: []int{0, 1},
			mend: func(p []part) []part { return p[1:] },
		},
		{
			name:  "sources that agree but for rounding",
			parts: []part{emf(1, 0, 0.1), emf(2, 1, 0.2), emf(2, 0, 0.3), ohms(2, 0, 10)},
			code:  solver.Undetermined, branches: []int{0, 1, 2},
			mend: func(p []part) []part { return p[1:] },
		},
		{
			name:  "two closed contacts without resistance in parallel",
			parts: []part{emf(1, 0, 24), wire(1, 2), wire(2, 1), ohms(2, 0, 10)},
			code:  solver.Undetermined, branches: []int{1, 2},
			mend: func(p []part) []part { return slices.Delete(p, 2, 3) },
		},
		{
			name:  "a current source whose loop two contacts interrupt",
			parts: []part{drive(0, 1, 0.02), open(1, 2), ohms(2, 3, 250), open(3, 0), open(1, 4), ohms(4, 5, 1)},
			code:  solver.NoReturnPath, branches: []int{0}, sum: 0.02, open: []int{1, 3},
			mend: func(p []part) []part { p[1], p[3] = wire(1, 2), wire(3, 0); return p },
		},
		{
			name:  "a current source as a bridge",
			parts: []part{emf(1, 0, 24), ohms(1, 0, 10), drive(1, 2, 1), ohms(2, 3, 5)},
			code:  solver.NoReturnPath, branches: []int{2}, sum: 1,
			mend: func(p []part) []part { return append(p, ohms(3, 0, 1)) },
		},
		{
			name:  "two current sources in series that disagree",
			parts: []part{drive(0, 1, 1), drive(1, 2, 3), ohms(2, 0, 10)},
			code:  solver.NoReturnPath, branches: []int{0, 1}, sum: 2,
			mend: func(p []part) []part { return append(p, ohms(1, 0, 1)) },
		},
		{
			name:  "two equal current sources in series",
			parts: []part{drive(0, 1, 1), drive(1, 2, 1), ohms(2, 0, 10)},
			code:  solver.Undetermined, branches: []int{0, 1},
			mend: func(p []part) []part { return append(p, ohms(1, 0, 1)) },
		},
		{
			name:  "a controlled current source without a way back",
			parts: []part{emf(1, 0, 5), ohms(1, 0, 10), vccs(1, 2, 1, 0.1), open(2, 0)},
			code:  solver.NoReturnPath, branches: []int{2}, open: []int{3},
			mend: func(p []part) []part { p[3] = ohms(2, 0, 5); return p },
		},
		{
			name:  "a source that repeats its own voltage",
			parts: []part{vcvs(1, 0, 1, 1), ohms(1, 0, 10), emf(2, 0, 5), ohms(2, 0, 1)},
			code:  solver.ControlLoop, branches: []int{0},
			mend: func(p []part) []part { p[0] = vcvs(1, 0, 2, 2); return p },
		},
		{
			name:  "two sources that control each other with a loop gain of one",
			parts: []part{vcvs(1, 0, 3, 2), ohms(1, 0, 10), vcvs(2, 0, 1, 0.5), ohms(2, 0, 10)},
			code:  solver.ControlLoop, branches: []int{0, 2},
			mend: func(p []part) []part { p[2] = vcvs(2, 0, 1, 0.25); return p },
		},
		{
			name:  "a control that reads the voltage of a contact that floats",
			parts: []part{emf(1, 0, 24), open(1, 2), open(2, 0), vcvs(3, 0, 1, 1), ohms(3, 0, 5), ohms(1, 0, 5)},
			code:  solver.Undetermined, branches: []int{1, 3},
			mend: func(p []part) []part { p[2] = ohms(2, 0, 100); return p },
		},
		{
			name:  "resistances that add up to nothing around a loop",
			parts: []part{ohms(0, 1, 5), ohms(1, 0, -5), ohms(0, 2, 3)},
			code:  solver.Undetermined, branches: []int{0, 1},
			mend: func(p []part) []part { p[1] = ohms(1, 0, 5); return p },
		},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			_, err := solver.Solve(context.Background(), network(c.parts...))
			var problem *solver.Problem
			if !errors.As(err, &problem) {
				t.Fatalf("the error is %v, want a problem", err)
			}
			if problem.Code != c.code || !slices.Equal(problem.Branches, c.branches) {
				t.Errorf("%s in %v, want %s in %v", problem.Code, problem.Branches, c.code, c.branches)
			}
			if gap := problem.Sum - c.sum; real(gap)*real(gap) > 1e-20 {
				t.Errorf("the sum is %v, want %v", problem.Sum, c.sum)
			}
			if !slices.Equal(problem.Open, c.open) {
				t.Errorf("open branches %v, want %v", problem.Open, c.open)
			}
			checkLoop(t, network(c.parts...), problem)
			mended := network(c.mend(slices.Clone(c.parts))...)
			if _, err := solver.Solve(context.Background(), mended); err != nil {
				t.Errorf("mended, it gives %v", err)
			}
		})
	}
}

// checkLoop checks that a problem's loop closes, and that its sum is that of its voltages.
func checkLoop(t *testing.T, n *solver.Network[float64], problem *solver.Problem) {
	t.Helper()
	sum := 0.0
	for k, step := range problem.Loop {
		next := problem.Loop[(k+1)%len(problem.Loop)]
		if end(n, step, step.Sense) != end(n, next, -next.Sense) {
			t.Errorf("the loop %v does not close after branch %d", problem.Loop, step.Branch)
		}
		sum += float64(step.Sense) * n.Branches[step.Branch].Law.Gamma
	}
	if len(problem.Loop) > 0 && abs(sum-real(problem.Sum)) > 1e-12 {
		t.Errorf("the loop %v adds up to %g, the sum is %v", problem.Loop, sum, problem.Sum)
	}
}

// end is the node at one end of a step: where its branch comes from for a sense of −1, where it goes to for +1.
func end(n *solver.Network[float64], step solver.Step, sense int) int {
	if sense > 0 {
		return n.Branches[step.Branch].To
	}
	return n.Branches[step.Branch].From
}

func TestSourcesAtPhasesThatDisagreeAreASourceLoop(t *testing.T) {
	n := &solver.Network[complex128]{Nodes: 2, Branches: []solver.Branch[complex128]{
		{From: 1, To: 0, Law: solver.VoltageSource[complex128](230)},
		{From: 1, To: 0, Law: solver.VoltageSource(complex(0, 230))},
	}}
	n.Meshes = solver.FundamentalLoops(n.Nodes, n.Branches)
	_, err := solver.Solve(context.Background(), n)
	var problem *solver.Problem
	if !errors.As(err, &problem) || problem.Code != solver.SourceLoop {
		t.Fatalf("the error is %v", err)
	}
	if got := problem.Sum; got != complex(230, -230) && got != complex(-230, 230) {
		t.Errorf("the sum is %v", got)
	}
}

// At resonance a coil and a capacitor in parallel have no impedance around their loop; any current could circulate.
func TestAResonantLoopWithoutResistanceIsUndetermined(t *testing.T) {
	n := &solver.Network[complex128]{Nodes: 3, Branches: []solver.Branch[complex128]{
		{From: 1, To: 0, Law: solver.Impedance(complex(0, 100), 0)},
		{From: 1, To: 0, Law: solver.Impedance(complex(0, -100), 0)},
		{From: 2, To: 0, Law: solver.Impedance[complex128](10, 24)},
	}}
	n.Meshes = solver.FundamentalLoops(n.Nodes, n.Branches)
	_, err := solver.Solve(context.Background(), n)
	var problem *solver.Problem
	if !errors.As(err, &problem) || problem.Code != solver.Undetermined || !slices.Equal(problem.Branches, []int{0, 1}) {
		t.Fatalf("the error is %v", err)
	}
}

// Every problem must name a branch whose change removes it: after at most as many changes as there are branches, there is a
// solution.
func TestChangingWhatIsNamedLeadsToASolution(t *testing.T) {
	random := rand.New(rand.NewPCG(71, 1))
	mix := solvertest.Mix{Decades: 2, Ideal: 0.3, Real: 0.1, Currents: 0.2, Open: 0.2}
	seen := map[solver.Code]int{}
	for trial := range 400 {
		n := solvertest.Multigraph(random, 2+random.IntN(6), 2+random.IntN(12), mix.RealLaws(random))
		changes := 0
		for ; ; changes++ {
			_, err := solver.Solve(context.Background(), n)
			var problem *solver.Problem
			if !errors.As(err, &problem) {
				break
			}
			seen[problem.Code]++
			if changes > len(n.Branches) || len(problem.Branches) == 0 {
				t.Fatalf("trial %d: after %d changes there is still %v", trial, changes, problem)
			}
			change(n, problem)
		}
	}
	for _, code := range []solver.Code{solver.ShortedSource, solver.SourceLoop, solver.NoReturnPath, solver.Undetermined} {
		if seen[code] < 10 {
			t.Errorf("%s was met %d times: the test asks for too little", code, seen[code])
		}
	}
}

// change closes the contacts that would give a current a way back; else it puts 1 Ω in series with an ideal branch, or opens
// a current source.
func change(n *solver.Network[float64], problem *solver.Problem) {
	for _, b := range problem.Open {
		n.Branches[b].Law = solver.Impedance(1.0, 0)
	}
	if len(problem.Open) > 0 {
		return
	}
	law := &n.Branches[problem.Branches[0]].Law
	if law.Beta == 0 {
		*law = solver.Open[float64]()
	} else {
		law.Alpha = -1
	}
}
