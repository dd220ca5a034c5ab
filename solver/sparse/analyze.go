package sparse

import "context"

// Symbolic is the analysis of a pattern: the order in which its columns are eliminated. It never changes and may be
// shared between goroutines.
type Symbolic struct {
	Pattern *Pattern
	Order   []int // column Order[k] is eliminated k-th
}

// Analyze orders the columns of a pattern so that its factors stay sparse when most pivots can be taken from the
// diagonal: by approximate minimum degree in the graph of A + Aᵀ.
//
// waiting marks the columns whose diagonal entry may be zero until a neighbour has been eliminated, as those of the
// constraints of a saddle point are; nil marks none. They are ordered after at least one of their neighbours, as far as
// that is possible, so that their pivots need not come from elsewhere: see Benzi, Golub and Liesen, "Numerical solution of
// saddle point problems", Acta Numerica 14 (2005), section 7. The error is that of ctx.
func Analyze(ctx context.Context, p *Pattern, waiting []bool) (*Symbolic, error) {
	if waiting != nil && len(waiting) != p.N {
		panic(errLength)
	}
	if p.N <= smallOrder {
		return &Symbolic{Pattern: p, Order: orderSmall(p, waiting)}, nil
	}
	q := newSymmetricQuotient(p)
	copy(q.waiting, waiting)
	order, err := q.order(ctx)
	if err != nil {
		return nil, err
	}
	return &Symbolic{Pattern: p, Order: order}, nil
}

// AnalyzeColumns orders the columns of a pattern for pivots that may come from any row: by approximate minimum degree in
// the graph of AᵀA, which is never formed, after Davis, Gilbert, Larimore and Ng, "A column approximate minimum degree
// ordering algorithm", ACM Transactions on Mathematical Software 30 (2004).
func AnalyzeColumns(ctx context.Context, p *Pattern) (*Symbolic, error) {
	order, err := newColumnQuotient(p).order(ctx)
	if err != nil {
		return nil, err
	}
	return &Symbolic{Pattern: p, Order: order}, nil
}
