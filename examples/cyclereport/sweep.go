package main

import (
	"context"
	"encoding/csv"
	"fmt"
	"io"
	"math"
	"runtime"
	"strconv"
	"sync"
	"sync/atomic"
	"time"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// A row is the linkage at one position of the drive.
type row struct {
	in     float64
	err    error // why there is none
	tool   rigid.Point
	curve  rigid.Point
	terms  rigid.AccelerationTerms
	pole   r2.Vec // of the rolling link, in the frame; NaN where it is at infinity
	moving r2.Vec // the same, in the link
	band   float64
}

// along returns the tool's motion along the direction of the configuration.
func (m *machine) along(p rigid.Point) rigid.Coordinate {
	sin, cos := math.Sincos(m.Direction)
	u := r2.Vec{X: cos, Y: sin}
	return rigid.Coordinate{Pos: r2.Dot(u, p.Pos), Vel: r2.Dot(u, p.Vel), Acc: r2.Dot(u, p.Acc)}
}

// sweep solves n positions on all processors, a State to each, and shows how far it
// is where that takes long.
func sweep(ctx context.Context, m *machine, n int, stderr io.Writer) ([]row, error) {
	rows := make([]row, n)
	workers := min(runtime.GOMAXPROCS(0), n)
	var done atomic.Int64
	var all sync.WaitGroup
	for w := range workers {
		all.Go(func() {
			st := m.start.Clone()
			for k := w * n / workers; k < (w+1)*n/workers && ctx.Err() == nil; k++ {
				rows[k] = m.solve(st, m.From+(m.To-m.From)*float64(k)/float64(n-1))
				done.Add(1)
			}
		})
	}
	finished := make(chan struct{})
	go func() { all.Wait(); close(finished) }()
	for tick := time.NewTicker(500 * time.Millisecond); ; {
		select {
		case <-tick.C:
			fmt.Fprintf(stderr, "%d of %d positions\n", done.Load(), n)
		case <-finished:
			tick.Stop()
			return rows, check(ctx, rows)
		}
	}
}

// check reports an interrupt, and a cycle of which no position can be reached.
func check(ctx context.Context, rows []row) error {
	if err := ctx.Err(); err != nil {
		return err
	}
	for i := range rows {
		if rows[i].err == nil {
			return nil
		}
	}
	return fmt.Errorf("no position can be reached: %w", rows[0].err)
}

func (m *machine) solve(st *planar.State, in float64) row {
	r := row{in: in, err: st.Move(rigid.Coordinate{Pos: in, Vel: m.Speed}), band: math.NaN()}
	if r.err != nil {
		return r
	}
	r.tool, r.curve = st.Point(m.tool), st.Point(m.curve)
	r.terms = st.AccelerationTerms(m.of, m.in)
	var err error
	if r.pole, err = st.Pole(m.rolling, planar.Frame); err != nil {
		r.pole = r2.Vec{X: math.NaN(), Y: math.NaN()}
	}
	r.moving = st.Motion(m.rolling).Pose.Local(r.pole)
	by := make([]rigid.Point, len(m.dimensions))
	if st.Sensitivity(by, m.tool, m.dimensions...) == nil {
		r.band = 0
		for i, p := range by {
			r.band += math.Abs(m.along(p).Pos) * m.tolerances[i]
		}
	}
	return r
}

// writeTable writes every position as a line of a table.
func writeTable(w io.Writer, m *machine, rows []row) error {
	t := csv.NewWriter(w)
	t.Write([]string{
		"drive", "tool_x_m", "tool_y_m", "way_m", "speed_m_s", "acc_m_s2", "band_m",
		"base_m_s2", "tangential_m_s2", "normal_m_s2", "relative_m_s2", "coriolis_m_s2", "curve_x_m", "curve_y_m", "error",
	})
	num := func(x float64) string {
		if math.IsNaN(x) {
			return ""
		}
		return strconv.FormatFloat(x, 'g', -1, 64)
	}
	for _, r := range rows {
		line := []string{num(r.in)}
		if r.err != nil {
			line = append(append(line, make([]string, 13)...), r.err.Error())
		} else {
			way := m.along(r.tool)
			for _, x := range []float64{
				r.tool.Pos.X, r.tool.Pos.Y, way.Pos, way.Vel, way.Acc, r.band,
				r2.Norm(r.terms.Base), r2.Norm(r.terms.Tangential), r2.Norm(r.terms.Normal), r2.Norm(r.terms.Relative), r2.Norm(r.terms.Coriolis),
				r.curve.Pos.X, r.curve.Pos.Y,
			} {
				line = append(line, num(x))
			}
			line = append(line, "")
		}
		t.Write(line)
	}
	t.Flush()
	return t.Error()
}
