package solver

import (
	"context"
	"time"
)

// Audit checks a solution that the plan has given, under the laws that it was solved with, and fills in solution.Audit. The
// error is that of ctx; a solution that is wrong is not an error but an audit that is not passed.
func (p *Plan[T]) Audit(ctx context.Context, solution *Solution[T]) error {
	start := time.Now()
	largest := largestOf(solution)
	audit := Audit{
		KCL:   ratio(p.currentGap(solution), largest.current),
		KVL:   ratio(p.voltageGap(solution), largest.voltage),
		Power: ratio(p.powerGap(solution), largest.power),
	}
	gap, err := p.nodalGap(ctx, solution, largest)
	if err != nil {
		return err
	}
	audit.NodalGap = gap
	audit.Passed = audit.KCL < AuditLimit && audit.KVL < AuditLimit && audit.Power < AuditLimit && audit.NodalGap < AuditLimit
	solution.Audit = audit
	solution.Timing.Audit = time.Since(start)
	return nil
}

// extent holds the largest values of a case.
type extent struct{ current, voltage, power float64 }

// largestOf finds them. The EMF of a source belongs to the voltages, also where its impedance takes all of it.
func largestOf[T Scalar](solution *Solution[T]) extent {
	var e extent
	for b, j := range solution.Current {
		u, law := solution.Voltage[b], &solution.Laws[b]
		e.current = max(e.current, modulus(j))
		e.voltage = max(e.voltage, modulus(u))
		e.power = max(e.power, modulus(u)*modulus(j))
		if law.Beta == 1 {
			e.voltage = max(e.voltage, modulus(law.Gamma))
		}
	}
	for _, v := range solution.Node {
		e.voltage = max(e.voltage, modulus(v))
	}
	return e
}

// ratio is a/b, and 0 for 0/0.
func ratio(a, b float64) float64 {
	if a == 0 {
		return 0
	}
	if b == 0 {
		return 1
	}
	return a / b
}

// beyondRounding is what is left of a sum when the rounding of its terms, whose magnitudes sum to total, is allowed for.
func beyondRounding[T Scalar](sum T, total float64) float64 {
	if gap := modulus(sum); gap > 16*epsilon*total {
		return gap
	}
	return 0
}

// currentGap is the largest sum of currents at a node.
func (p *Plan[T]) currentGap(solution *Solution[T]) float64 {
	sum := make([]T, p.network.Nodes)
	total := make([]float64, p.network.Nodes)
	for b, j := range solution.Current {
		from, to := p.network.Branches[b].From, p.network.Branches[b].To
		sum[from] += j
		sum[to] -= j
		total[from] += magnitude(j)
		total[to] += magnitude(j)
	}
	gap := 0.0
	for node := range sum {
		gap = max(gap, beyondRounding(sum[node], total[node]))
	}
	return gap
}

// voltageGap is the largest sum of voltages around a mesh. Voltages are those that the branches' laws give for their
// currents; only where a law sets the current is the voltage that of the solution.
func (p *Plan[T]) voltageGap(solution *Solution[T]) float64 {
	gap := 0.0
	for _, mesh := range p.network.Meshes {
		var sum T
		total := 0.0
		floating := false
		for _, step := range mesh.Path {
			u, terms := lawVoltage(solution, step.Branch)
			sum += signed(step.Sense, u)
			total += terms
			floating = floating || solution.FloatingBranch[step.Branch]
		}
		if !floating {
			gap = max(gap, beyondRounding(sum, total))
		}
	}
	return gap
}

// lawVoltage gives the voltage of a branch by its law, and the sum of the magnitudes that it is made of.
func lawVoltage[T Scalar](solution *Solution[T], b int) (u T, total float64) {
	law := &solution.Laws[b]
	if law.Beta == 0 {
		return solution.Voltage[b], magnitude(solution.Voltage[b])
	}
	drop := law.Alpha * solution.Current[b]
	u, total = law.Gamma-drop, magnitude(law.Gamma)+magnitude(drop)
	for _, term := range law.Terms {
		part := term.Alpha*solution.Current[term.Branch] + term.Beta*solution.Voltage[term.Branch]
		u -= part
		total += magnitude(part)
	}
	return u / law.Beta, total / magnitude(law.Beta)
}

// powerGap is the sum of all absorbed powers, which Tellegen's theorem says is zero.
func (p *Plan[T]) powerGap(solution *Solution[T]) float64 {
	var sum T
	total := 0.0
	for b, j := range solution.Current {
		power := solution.Voltage[b] * conjugate(j)
		sum += power
		total += magnitude(power)
	}
	return beyondRounding(sum, total)
}

// nodalGap is the largest relative difference to the second method.
func (p *Plan[T]) nodalGap(ctx context.Context, solution *Solution[T], largest extent) (float64, error) {
	if p.nodal == nil {
		nodal, err := newNodalSystem(ctx, p.network, solution.Laws)
		if err != nil {
			return 0, err
		}
		p.nodal = nodal
	}
	if solved, err := p.nodal.solve(ctx, solution.Laws); err != nil || !solved {
		return 1, err
	}
	currents, voltages := 0.0, 0.0
	for b, j := range solution.Current {
		currents = max(currents, modulus(j-p.nodal.current[b]))
		if !solution.FloatingBranch[b] {
			branch := p.network.Branches[b]
			voltages = max(voltages, modulus(solution.Voltage[b]-p.nodal.voltage(branch.From, branch.To)))
		}
	}
	for k, v := range solution.Node {
		if !solution.FloatingNode[k] {
			voltages = max(voltages, modulus(v-p.nodal.voltage(k, p.network.Reference)))
		}
	}
	return max(ratio(currents, largest.current), ratio(voltages, largest.voltage)), nil
}
