package planar

import "slices"

// A Linkage is a design whose structure is known. It is immutable: any number of
// goroutines may share it. The zero Linkage comes from no New and has no links.
type Linkage struct {
	design  Design
	program *program
}

// New checks a design and finds its groups. Its error is a *DesignError, caused by
//
//	ErrReference         a link that does not exist, or a joint or drive of no use
//	rigid.ErrNotFinite   and its like, in a *rigid.DimensionError: a wrong number
//	ErrOverconstrained   joints or drives that hold each other doubly
//	ErrUnderconstrained  links that stay free with every drive held
//	ErrInconsistent      joints that contradict each other, and by how much
//
// Lengths lie between 1e-60 and 1e60 m. Joints that repeat others and agree with them
// by their dimensions, as the third crank of a double parallelogram, are checked on
// each Move instead of solved: to see that they agree, New needs a Guess, of at most
// 200 links: for 40 it takes a third of a second, for 200 about twelve seconds.
func New(d Design) (*Linkage, error) {
	d = d.clone()
	if err := d.validate(); err != nil {
		return nil, err
	}
	s, err := solvable(&d)
	if err != nil {
		return nil, err
	}
	p, err := compile(s, d.Links)
	if err != nil {
		return nil, err
	}
	return &Linkage{design: d, program: p}, nil
}

// Design returns a copy of the design that New was given.
func (l *Linkage) Design() Design { return l.design.clone() }

func (d *Design) clone() Design {
	return Design{
		Links:  slices.Clone(d.Links),
		Joints: slices.Clone(d.Joints),
		Drives: slices.Clone(d.Drives),
		Guess:  slices.Clone(d.Guess),
	}
}

// Mobility returns the number of motions that the joints leave, which is that of the
// drives: New refuses a design with more or fewer.
func (l *Linkage) Mobility() int { return len(l.design.Drives) }

// Groups returns the driving links and Assur groups in the order of solution.
func (l *Linkage) Groups() []Group {
	if l.program == nil {
		return nil
	}
	groups := slices.Clone(l.program.groups)
	for i := range groups {
		groups[i].Links = slices.Clone(groups[i].Links)
	}
	return groups
}
