package solver

// terms gives every term of the left side. The order and the places are the same for all laws of one layout. A branch
// without row has the law u − Z·j = E, so its Alpha is −Z and its Gamma is E.
func (s *meshSystem[T]) terms(laws []Law[T], gauge []bool, emit func(equation, unknown int, value T)) {
	meshes := len(s.network.Meshes)
	for b := range laws {
		law := &laws[b]
		if s.row[b] < 0 {
			s.voltageDrop(b, scaled(law.Alpha, -1/s.ohms), emit)
			continue
		}
		row := meshes + s.row[b]
		alpha, beta := law.Alpha, law.Beta
		if gauge != nil && gauge[b] {
			alpha, beta = 0, 1
		}
		through, senses := s.through.of(b)
		for k, m := range through {
			emit(m, row, scalar[T](float64(senses[k])))
			emit(row, m, scaled(alpha, float64(senses[k])/s.ohms))
		}
		emit(row, row, beta)
		for k := range law.Terms {
			s.control(row, &law.Terms[k], &laws[law.Terms[k].Branch], emit)
		}
	}
}

// voltageDrop gives the terms of Z·j in the meshes through a branch.
func (s *meshSystem[T]) voltageDrop(b int, z T, emit func(equation, unknown int, value T)) {
	through, senses := s.through.of(b)
	for k, equation := range through {
		for l, unknown := range through {
			emit(equation, unknown, signed(senses[k]*senses[l], z))
		}
	}
}

// control gives the terms of a controlled source in its row.
func (s *meshSystem[T]) control(row int, term *Term[T], law *Law[T], emit func(equation, unknown int, value T)) {
	alpha := term.Alpha
	if r := s.row[term.Branch]; r >= 0 {
		emit(row, len(s.network.Meshes)+r, term.Beta)
	} else {
		alpha -= term.Beta * law.Alpha
	}
	through, senses := s.through.of(term.Branch)
	for k, m := range through {
		emit(row, m, scaled(alpha, float64(senses[k])/s.ohms))
	}
}
