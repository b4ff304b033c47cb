package main

import (
	"image/color"
	"slices"

	"gonum.org/v1/gonum/spatial/r2"
	"gonum.org/v1/plot"
	"gonum.org/v1/plot/plotter"
	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/draw"

	"example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// drawLinkage draws the links at several positions of the cycle, the first darkest.
func drawLinkage(m *machine, rows []row) (vg.Length, []*plot.Plot, error) {
	p := chart("The linkage at some positions of its cycle", "x, m", "y, m")
	inks := []color.NRGBA{blue, red, green, purple, sky, grey}
	st, outlines := m.start.Clone(), outlines(&m.Design)
	for i := m.Poses - 1; i >= 0; i-- {
		in := rows[i*(len(rows)-1)/m.Poses].in
		if st.Move(rigid.Coordinate{Pos: in}) != nil {
			continue
		}
		for l, outline := range outlines {
			if l == 0 || len(outline) == 0 {
				continue
			}
			ink := inks[(l-1)%len(inks)]
			if i > 0 {
				ink.A = 70
			}
			if err := drawLink(p, st, planar.Link(l), outline, ink, i == 0, m.Design.Links[l]); err != nil {
				return 0, nil, err
			}
		}
	}
	return square(p), []*plot.Plot{p}, nil
}

func drawLink(p *plot.Plot, st *planar.State, l planar.Link, outline []r2.Vec, ink color.NRGBA, first bool, name string) error {
	points := make(plotter.XYs, 0, len(outline)+1)
	for _, local := range outline {
		points = append(points, xy(st.Point(l.At(local.X, local.Y)).Pos))
	}
	pins, err := plotter.NewScatter(points)
	if err != nil {
		return err
	}
	pins.GlyphStyle = draw.GlyphStyle{Color: ink, Radius: vg.Points(2.5), Shape: draw.CircleGlyph{}}
	p.Add(pins)
	if first {
		p.Legend.Add(name, pins)
	}
	if len(points) > 2 {
		points = append(points, points[0])
	}
	return line(p, points, ink, 1.8, "")
}

// outlines returns the points at which each link is joined, in the link's axes.
func outlines(d *planar.Design) [][]r2.Vec {
	all := make([][]r2.Vec, len(d.Links))
	add := func(l planar.Link, x, y float64) {
		if v := (r2.Vec{X: x, Y: y}); !slices.Contains(all[l], v) {
			all[l] = append(all[l], v)
		}
	}
	pin := func(a planar.Attachment) { add(a.Link, a.X, a.Y) }
	guide := func(a planar.Line) { add(a.Link, a.X, a.Y) }
	for _, j := range d.Joints {
		switch j := j.(type) {
		case planar.Revolute:
			pin(j.A)
			pin(j.B)
		case planar.Prismatic:
			guide(j.A)
			guide(j.B)
		case planar.SlidingPin:
			pin(j.Pin)
			guide(j.Slot)
		case planar.Fixed:
			guide(j.A)
			guide(j.B)
		case planar.RackPair:
			pin(j.Pinion)
			guide(j.Rack)
		}
	}
	for _, t := range d.Drives {
		if r, ok := t.(planar.Reach); ok {
			pin(r.A)
			pin(r.B)
		}
	}
	return all
}
