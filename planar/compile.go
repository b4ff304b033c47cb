package planar

// A program says how a system is solved.
type program struct{}

// compile turns the blocks of a system into steps.
func compile(s *system) (*program, error) { return &program{}, nil }
