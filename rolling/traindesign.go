package rolling

import (
	"slices"
	"strconv"
)

// A Member is the index of a member in TrainDesign.Members; 0 is the frame. Members
// turn about the train's axis, or, as planets, about axes that a carrier carries.
type Member int

// A Mesh is two gears that mesh, friction wheels or a toothed belt's pulleys whose
// centres Arm holds: a carrier, or the frame for fixed axes. Their turns obey Willis'
// equation
//
//	(A − Arm)·TeethA = −(B − Arm)·TeethB,  + when Internal
//
// Internal: one of the two is a ring with internal teeth; an open belt is Internal
// too, a crossed one is not. A stepped planet is one member in several meshes, and so
// is a shaft with several gears.
type Mesh struct {
	A        Member `json:"a"`
	B        Member `json:"b"`
	Arm      Member `json:"arm"`
	TeethA   int    `json:"teethA"`
	TeethB   int    `json:"teethB"`
	Internal bool   `json:"internal"`
}

// A TrainDesign describes a gear train as plain data. A gear that is fixed for good
// is the frame; one that a brake holds is a member driven at 0. In JSON, meshes and
// drives tell members by their index in Members.
type TrainDesign struct {
	Members []string `json:"members"` // names; Members[0] is the frame's
	Meshes  []Mesh   `json:"meshes"`
	Drives  []Member `json:"drives"` // the members whose turns are given
}

// Member appends a member and returns it. In a design without members it puts the
// frame first, which is Member 0: don't append it yourself.
func (d *TrainDesign) Member(name string) Member {
	if len(d.Members) == 0 {
		d.Members = append(d.Members, "frame")
	}
	d.Members = append(d.Members, name)
	return Member(len(d.Members) - 1)
}

// clone returns a deep copy.
func (d *TrainDesign) clone() TrainDesign {
	return TrainDesign{Members: slices.Clone(d.Members), Meshes: slices.Clone(d.Meshes), Drives: slices.Clone(d.Drives)}
}

// has reports whether m is a member of the design, the frame included.
func (d *TrainDesign) has(m Member) bool { return m >= 0 && int(m) < len(d.Members) }

// name returns the name of a member of the design, or its path if it has none.
func (d *TrainDesign) name(m Member) string {
	if name := d.Members[m]; name != "" {
		return name
	}
	return "Members[" + strconv.Itoa(int(m)) + "]"
}

// check reports names that occur twice, members that are not in the design, meshes
// of a member with itself and teeth below one.
func (d *TrainDesign) check(r *report) {
	if len(d.Members) < 2 {
		r.Add("Members", float64(len(d.Members)), errFew)
	}
	for i, name := range d.Members {
		if name != "" && slices.Contains(d.Members[:i], name) {
			r.member(name, errTwice)
		}
	}
	for i, m := range d.Meshes {
		d.checkMesh(r, m, "Meshes["+strconv.Itoa(i)+"]")
	}
	for i, m := range d.Drives {
		path := "Drives[" + strconv.Itoa(i) + "]"
		switch {
		case !d.has(m):
			r.Add(path, float64(m), errNone)
		case m == 0:
			r.Add(path, 0, errFrame)
		case slices.Contains(d.Drives[:i], m):
			r.member(d.name(m), errTwice)
		}
	}
}

func (d *TrainDesign) checkMesh(r *report, m Mesh, path string) {
	known := true
	for _, end := range [...]struct {
		field  string
		member Member
	}{{".A", m.A}, {".B", m.B}, {".Arm", m.Arm}} {
		if !d.has(end.member) {
			r.Add(path+end.field, float64(end.member), errNone)
			known = false
		}
	}
	if !known {
		return
	}
	r.teeth(d.name(m.A), m.TeethA)
	r.teeth(d.name(m.B), m.TeethB)
	switch {
	case m.A == m.B, m.A == m.Arm:
		r.member(d.name(m.A), errSelf)
	case m.B == m.Arm:
		r.member(d.name(m.B), errSelf)
	}
}
