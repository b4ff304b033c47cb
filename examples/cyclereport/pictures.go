package main

import (
	"image/color"
	"io"
	"math"
	"strconv"

	"gonum.org/v1/gonum/spatial/r2"
	"gonum.org/v1/plot"
	"gonum.org/v1/plot/plotter"
	"gonum.org/v1/plot/vg"

	"example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// pictures are the report's pictures.
func pictures(format string) []page {
	var pages []page
	for _, p := range []struct {
		name string
		draw func(m *machine, rows []row) (vg.Length, []*plot.Plot, error)
	}{
		{"motion", drawMotion}, {"terms", drawTerms}, {"curve", drawCurve}, {"linkage", drawLinkage},
		{"hodograph", drawHodograph}, {"poles", drawPoles}, {"band", drawBand},
	} {
		pages = append(pages, page{p.name + "." + format, func(w io.Writer, m *machine, rows []row) error {
			height, panels, err := p.draw(m, rows)
			if err != nil {
				return err
			}
			return render(w, format, height, panels...)
		}})
	}
	return pages
}

// drive names the drive's axis, and the factor to its unit.
func (m *machine) drive() (label string, unit float64) {
	if _, ok := m.Design.Drives[0].(planar.Turn); ok {
		return "drive, degrees", rigid.Degree
	}
	return "drive, mm", rigid.Millimetre
}

// overDrive returns a chart over the drive, its axis marked at parts of a turn.
func (m *machine) overDrive(title, y string) *plot.Plot {
	label, unit := m.drive()
	p := chart(title, label, y)
	if unit == rigid.Degree {
		step := 30.0
		for (m.To-m.From)/unit/step > 12 {
			step *= 2
		}
		var marks plot.ConstantTicks
		for at := math.Ceil(m.From/unit/step) * step; at <= m.To/unit+1e-9; at += step {
			marks = append(marks, plot.Tick{Value: at, Label: strconv.FormatFloat(at, 'f', -1, 64)})
		}
		p.X.Tick.Marker = marks
	}
	return p
}

// over returns a quantity over the drive, NaN where there is no position.
func (m *machine) over(rows []row, of func(r *row) float64) plotter.XYs {
	_, unit := m.drive()
	points := make(plotter.XYs, len(rows))
	for i := range rows {
		points[i] = plotter.XY{X: rows[i].in / unit, Y: math.NaN()}
		if rows[i].err == nil {
			points[i].Y = of(&rows[i])
		}
	}
	return points
}

func track(rows []row, of func(r *row) r2.Vec) plotter.XYs {
	points := make(plotter.XYs, len(rows))
	for i := range rows {
		points[i].X = math.NaN()
		if rows[i].err == nil {
			points[i] = xy(of(&rows[i]))
		}
	}
	return points
}

func drawMotion(m *machine, rows []row) (vg.Length, []*plot.Plot, error) {
	var panels []*plot.Plot
	for _, q := range []struct {
		label string
		ink   color.Color
		of    func(c rigid.Coordinate) float64
	}{
		{"way, mm", blue, func(c rigid.Coordinate) float64 { return c.Pos / rigid.Millimetre }},
		{"speed, m/s", green, func(c rigid.Coordinate) float64 { return c.Vel }},
		{"acceleration, m/s²", red, func(c rigid.Coordinate) float64 { return c.Acc }},
	} {
		p := m.overDrive("", q.label)
		if err := line(p, m.over(rows, func(r *row) float64 { return q.of(m.along(r.tool)) }), q.ink, 1.5, ""); err != nil {
			return 0, nil, err
		}
		panels = append(panels, p)
	}
	panels[0].Title.Text = "Motion of the tool: point of " + m.Tool.Link
	return 8 * vg.Inch, panels, nil
}

// drawTerms stacks the terms along the direction of the acceleration itself, so
// that what is above 0 and what is below make up its size.
func drawTerms(m *machine, rows []row) (vg.Length, []*plot.Plot, error) {
	p := m.overDrive("Acceleration of a point of "+m.Terms.Of.Link+", by its terms as seen from "+m.Terms.In, "along the acceleration, m/s²")
	above, below := m.over(rows, func(*row) float64 { return 0 }), m.over(rows, func(*row) float64 { return 0 })
	for _, t := range []struct {
		name string
		ink  color.Color
		of   func(t *rigid.AccelerationTerms) r2.Vec
	}{
		{"base", grey, func(t *rigid.AccelerationTerms) r2.Vec { return t.Base }},
		{"tangential", sky, func(t *rigid.AccelerationTerms) r2.Vec { return t.Tangential }},
		{"normal", blue, func(t *rigid.AccelerationTerms) r2.Vec { return t.Normal }},
		{"relative", green, func(t *rigid.AccelerationTerms) r2.Vec { return t.Relative }},
		{"Coriolis", red, func(t *rigid.AccelerationTerms) r2.Vec { return t.Coriolis }},
	} {
		part := m.over(rows, func(r *row) float64 {
			sum := r.terms.Sum()
			return r2.Dot(t.of(&r.terms), sum) / r2.Norm(sum)
		})
		up, down := stack(above, part, 1), stack(below, part, -1)
		for i, side := range [][2]plotter.XYs{{above, up}, {below, down}} {
			name := t.name
			if i > 0 {
				name = ""
			}
			if err := fill(p, bands(side[0], side[1]), t.ink, name); err != nil {
				return 0, nil, err
			}
		}
		above, below = up, down
	}
	total := m.over(rows, func(r *row) float64 { return r2.Norm(r.terms.Sum()) })
	err := line(p, total, black, 1.5, "sum")
	p.Y.Max += 0.35 * (p.Y.Max - p.Y.Min) // room for the legend
	return 5 * vg.Inch, []*plot.Plot{p}, err
}

// stack adds the part of a term that has the sign.
func stack(base, part plotter.XYs, sign float64) plotter.XYs {
	sum := make(plotter.XYs, len(base))
	for i := range sum {
		sum[i] = base[i]
		if sign*part[i].Y > 0 || math.IsNaN(part[i].Y) {
			sum[i].Y += part[i].Y
		}
	}
	return sum
}

// bands returns the areas between two curves over one axis, cut where there is none.
func bands(low, high plotter.XYs) (rings []plotter.XYs) {
	var ring, back plotter.XYs
	flush := func() {
		for i := len(back) - 1; i >= 0; i-- {
			ring = append(ring, back[i])
		}
		if len(ring) > 3 {
			rings = append(rings, ring)
		}
		ring, back = nil, nil
	}
	for i := range low {
		if math.IsNaN(low[i].Y) || math.IsNaN(high[i].Y) {
			flush()
			continue
		}
		ring, back = append(ring, low[i]), append(back, high[i])
	}
	flush()
	return rings
}

func drawCurve(m *machine, rows []row) (vg.Length, []*plot.Plot, error) {
	p := chart("Curve of a point of "+m.Curve.Link+", with its velocity", "x, m", "y, m")
	if err := line(p, track(rows, func(r *row) r2.Vec { return r.curve.Pos }), blue, 1.5, ""); err != nil {
		return 0, nil, err
	}
	fast := 0.0
	for i := range rows {
		if rows[i].err == nil {
			fast = math.Max(fast, r2.Norm(rows[i].curve.Vel))
		}
	}
	scale := 0.15 * math.Max(p.X.Max-p.X.Min, p.Y.Max-p.Y.Min) / fast
	for i := 0; i < len(rows); i += max(1, len(rows)/24) {
		if r := &rows[i]; r.err == nil {
			if err := arrow(p, r.curve.Pos, r2.Scale(scale, r.curve.Vel), red); err != nil {
				return 0, nil, err
			}
		}
	}
	return square(p), []*plot.Plot{p}, nil
}

func drawHodograph(m *machine, rows []row) (vg.Length, []*plot.Plot, error) {
	p := chart("Hodograph: velocity of a point of "+m.Curve.Link, "speed to the right, m/s", "speed upwards, m/s")
	if err := line(p, track(rows, func(r *row) r2.Vec { return r.curve.Vel }), green, 1.5, ""); err != nil {
		return 0, nil, err
	}
	return square(p), []*plot.Plot{p}, nil
}

// drawPoles draws the fixed pole curve, and the moving one as it lies at the start.
// Poles farther away than three times the extent of the curve's point are left out.
func drawPoles(m *machine, rows []row) (vg.Length, []*plot.Plot, error) {
	p := chart("Pole curves of "+m.Poles+": the moving one rolls on the fixed one", "x, m", "y, m")
	near := math.Inf(-1)
	for i := range rows {
		if rows[i].err == nil {
			near = math.Max(near, 3*r2.Norm(rows[i].curve.Pos))
		}
	}
	cut := func(v r2.Vec) r2.Vec {
		if !(r2.Norm(v) <= near) {
			return r2.Vec{X: math.NaN(), Y: math.NaN()}
		}
		return v
	}
	at := m.start.Motion(m.rolling).Pose
	if err := line(p, track(rows, func(r *row) r2.Vec { return cut(r.pole) }), blue, 1.5, "fixed"); err != nil {
		return 0, nil, err
	}
	if err := line(p, track(rows, func(r *row) r2.Vec { return cut(at.Point(r.moving)) }), red, 1.5, "moving", vg.Points(4), vg.Points(3)); err != nil {
		return 0, nil, err
	}
	return square(p), []*plot.Plot{p}, nil
}

func drawBand(m *machine, rows []row) (vg.Length, []*plot.Plot, error) {
	p := m.overDrive("Tolerance band of the tool's way, worst case", "off by, mm")
	off := m.over(rows, func(r *row) float64 { return r.band / rigid.Millimetre })
	less := make(plotter.XYs, len(off))
	for i, x := range off {
		less[i] = plotter.XY{X: x.X, Y: -x.Y}
	}
	if err := fill(p, bands(less, off), sky, ""); err != nil {
		return 0, nil, err
	}
	if err := line(p, off, blue, 1.2, ""); err != nil {
		return 0, nil, err
	}
	return 4 * vg.Inch, []*plot.Plot{p}, line(p, less, blue, 1.2, "")
}
