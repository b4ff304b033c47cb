package planar

// A group solves a group of higher class by Newton's method.
type group struct {
	n      *newton
	at     int   // of its workspace in scene.desks
	bodies []int // that it turns
}

func (o *group) place(was, to *scene) status {
	if st := o.n.place(to, &was.desks[o.at], &to.desks[o.at]); st != solved {
		return st
	}
	for _, b := range o.bodies {
		if !to.count(was, b) {
			return tooLong
		}
	}
	return solved
}

func (o *group) rates(sc *scene) bool {
	d := &sc.desks[o.at]
	if !d.regular() {
		d.still()
		return false
	}
	o.n.rates(sc, d)
	return true
}

func (o *group) margin(sc *scene) float64 { return sc.desks[o.at].margin() }
func (o *group) gap(sc *scene) float64    { return sc.desks[o.at].gap() }
func (o *group) choose(sc *scene) status  { return o.n.assemble(sc, &sc.desks[o.at]) }
