package main

import (
	"image/color"
	"io"
	"math"

	"gonum.org/v1/gonum/spatial/r2"
	"gonum.org/v1/plot"
	"gonum.org/v1/plot/plotter"
	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/draw"
)

// inks are colours that readers with any of the usual colour deficiencies tell
// apart (M. Okabe and K. Ito, Color Universal Design, 2008; from memory).
var (
	blue   = color.NRGBA{0, 114, 178, 255}
	red    = color.NRGBA{213, 94, 0, 255}
	green  = color.NRGBA{0, 158, 115, 255}
	purple = color.NRGBA{204, 121, 167, 255}
	sky    = color.NRGBA{86, 180, 233, 255}
	grey   = color.NRGBA{120, 120, 120, 255}
	black  = color.NRGBA{0, 0, 0, 255}
)

const width = 7 * vg.Inch

// render draws panels one above the other, their axes aligned.
func render(w io.Writer, format string, height vg.Length, panels ...*plot.Plot) error {
	c, err := draw.NewFormattedCanvas(width, height, format)
	if err != nil {
		return err
	}
	all := draw.New(c)
	if len(panels) == 1 {
		panels[0].Draw(draw.Crop(all, 0, -vg.Points(10), 0, -vg.Points(6)))
	} else {
		column := make([][]*plot.Plot, len(panels))
		for i, p := range panels {
			column[i] = []*plot.Plot{p}
		}
		tiles := draw.Tiles{Rows: len(panels), Cols: 1, PadY: vg.Points(10), PadRight: vg.Points(10), PadTop: vg.Points(6)}
		for i, row := range plot.Align(column, tiles, all) {
			panels[i].Draw(row[0])
		}
	}
	_, err = c.WriteTo(w)
	return err
}

func chart(title, x, y string) *plot.Plot {
	p := plot.New()
	p.Title.Text, p.X.Label.Text, p.Y.Label.Text = title, x, y
	p.Legend.Top = true
	p.Legend.Padding = vg.Points(2)
	grid := plotter.NewGrid()
	grid.Horizontal.Color, grid.Vertical.Color = color.Gray{225}, color.Gray{225}
	p.Add(grid)
	return p
}

// pieces cuts points at the NaNs among them.
func pieces(points plotter.XYs) (all []plotter.XYs) {
	var piece plotter.XYs
	for _, p := range append(points, plotter.XY{X: math.NaN()}) {
		if math.IsNaN(p.X) || math.IsNaN(p.Y) || math.IsInf(p.X, 0) || math.IsInf(p.Y, 0) {
			if len(piece) > 1 {
				all = append(all, piece)
			}
			piece = nil
			continue
		}
		piece = append(piece, p)
	}
	return all
}

// line draws a curve and enters it in the legend, if it has a name.
func line(p *plot.Plot, points plotter.XYs, c color.Color, thick float64, name string, dashes ...vg.Length) error {
	for i, piece := range pieces(points) {
		l, err := plotter.NewLine(piece)
		if err != nil {
			return err
		}
		l.Color, l.Width, l.Dashes = c, vg.Points(thick), dashes
		p.Add(l)
		if i == 0 && name != "" {
			p.Legend.Add(name, l)
		}
	}
	return nil
}

// arrow draws a vector from a point, both in the units of the axes.
func arrow(p *plot.Plot, from, by r2.Vec, c color.Color) error {
	const head = 0.25
	tip := r2.Add(from, by)
	side := r2.Vec{X: -by.Y * head / 2, Y: by.X * head / 2}
	neck := r2.Sub(tip, r2.Scale(head, by))
	a, b := r2.Add(neck, side), r2.Sub(neck, side)
	return line(p, plotter.XYs{xy(from), xy(tip), xy(a), xy(tip), xy(b)}, c, 0.8, "")
}

// fill draws areas without an outline and enters them in the legend, if they have a
// name.
func fill(p *plot.Plot, rings []plotter.XYs, c color.Color, name string) error {
	for i, ring := range rings {
		area, err := plotter.NewPolygon(ring)
		if err != nil {
			return err
		}
		area.Color, area.LineStyle.Width = c, 0
		p.Add(area)
		if i == 0 && name != "" {
			p.Legend.Add(name, area)
		}
	}
	return nil
}

func xy(v r2.Vec) plotter.XY { return plotter.XY{X: v.X, Y: v.Y} }

// square gives both axes one scale, and returns the height of the picture.
func square(p *plot.Plot) vg.Length {
	dx, dy := p.X.Max-p.X.Min, p.Y.Max-p.Y.Min
	margin := 0.05 * math.Max(dx, dy)
	p.X.Min, p.X.Max = p.X.Min-margin, p.X.Max+margin
	p.Y.Min, p.Y.Max = p.Y.Min-margin, p.Y.Max+margin
	const inner = width - 1.1*vg.Inch // without labels
	dx, dy = p.X.Max-p.X.Min, p.Y.Max-p.Y.Min
	height := inner * vg.Length(dy/dx)
	if height < 2*vg.Inch { // a flat figure: more of the plane above and below
		more := (dx*float64(2*vg.Inch/inner) - dy) / 2
		p.Y.Min, p.Y.Max, height = p.Y.Min-more, p.Y.Max+more, 2*vg.Inch
	}
	if height > 9*vg.Inch {
		more := (dy*float64(inner/(9*vg.Inch)) - dx) / 2
		p.X.Min, p.X.Max, height = p.X.Min-more, p.X.Max+more, 9*vg.Inch
	}
	return height + 0.9*vg.Inch
}
