package planar

// Ends returns how many simple complex solutions the first group of higher class has,
// at the inputs 0.
func Ends(l *Linkage) int {
	s := newState(l)
	for _, o := range l.program.ops {
		if o, ok := o.(*group); ok {
			d := &s.now.desks[o.at]
			o.n.prepare(s.now, d)
			e, _ := o.n.equations(s.now, d)
			ends, _ := e.Solve(0)
			n := 0
			for _, end := range ends {
				if end.Regular && !end.Infinite {
					n++
				}
			}
			return n
		}
		o.place(s.now, s.now)
	}
	return 0
}
