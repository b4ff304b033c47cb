package fourbar_test

import (
	"encoding/csv"
	"math"
	"math/big"
	"os"
	"strconv"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/fourbar"
	"example.com/twopoint/rigid"
)

// eps is the distance from 1 to the next float64.
const eps = 0x1p-52

// outputs are those of testdata/table.py, in its order.
func outputs(st *fourbar.State) []float64 {
	cr, co, fo := &st.Crank, &st.Coupler, &st.Follower
	return []float64{
		cr.Pose.Axis.X, cr.Pose.Axis.Y, co.Pose.Axis.X, co.Pose.Axis.Y, fo.Pose.Axis.X, fo.Pose.Axis.Y,
		cr.Omega, co.Omega, fo.Omega, cr.Alpha, co.Alpha, fo.Alpha,
		co.Pose.Origin.X, co.Pose.Origin.Y, co.Vel.X, co.Vel.Y, co.Acc.X, co.Acc.Y,
		st.Turn.Pos, st.Swing.Pos, st.Transmission,
	}
}

// TestTable compares every output of 607 linkages, driven by each of their
// links, with values to 50 digits. The bound is 4 eps of the output and of what a
// relative change of the inputs by eps does to it.
func TestTable(t *testing.T) {
	file, err := os.Open("testdata/table.csv")
	if err != nil {
		t.Fatal(err)
	}
	defer file.Close()
	rows, err := csv.NewReader(file).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	if len(rows) != 608 {
		t.Fatalf("%d rows, want 608", len(rows))
	}
	worst := map[string]float64{}
	for i, row := range rows[1:] {
		l, in, side := tableLinkage(t, row)
		var st fourbar.State
		switch row[0] {
		case "crank":
			err = l.Solve(&st, in)
		case "follower":
			err = l.SolveFollower(&st, in, side)
		case "coupler":
			err = l.SolveCoupler(&st, in, side)
		}
		if err != nil {
			t.Errorf("row %d %v: %v", i, row[:11], err)
			continue
		}
		if d := l.Dimensions(); !(gap(&st, d) <= 1e-14) {
			t.Errorf("row %d %v: the loop is open by %.2g of the longest link", i, row[:11], gap(&st, d))
		}
		if off := axes(&st); off > 3*eps {
			t.Errorf("row %d %v: an axis is off length 1 by %.2g", i, row[:11], off)
		}
		for j, got := range outputs(&st) {
			name := rows[0][11+2*j]
			bound := math.Abs(got) + number(t, row[12+2*j])
			off := difference(t, got, row[11+2*j])
			if name == "turn" || name == "swing" {
				off = rigid.Wrap(off)
			}
			if !(math.Abs(off) <= 4*eps*bound) {
				t.Errorf("row %d %v: %s = %v, off by %.3g = %.3g eps of %.3g", i, row[:11], name, got, off, math.Abs(off)/eps/bound, bound)
			}
			if bound > 0 {
				worst[row[0]] = max(worst[row[0]], math.Abs(off)/eps/bound)
			}
		}
	}
	t.Logf("worst, in eps: %.2v", worst)
}

// gap returns how far the loop is from closing, of the longest link.
func gap(st *fourbar.State, d fourbar.Dimensions) float64 {
	p, q := st.Coupler.At(r2.Vec{X: d.Coupler}).Pos, st.Follower.At(r2.Vec{X: d.Follower}).Pos
	return r2.Norm(r2.Sub(p, q)) / max(d.Frame, d.Crank, d.Coupler, d.Follower)
}

// axes returns the farthest that the length of an axis is from 1.
func axes(st *fourbar.State) float64 {
	off := 0.0
	for _, m := range [...]*rigid.Motion{&st.Crank, &st.Coupler, &st.Follower} {
		off = max(off, math.Abs(r2.Norm(m.Pose.Axis)-1))
	}
	return off
}

func number(t *testing.T, s string) float64 {
	t.Helper()
	x, err := strconv.ParseFloat(s, 64)
	if err != nil {
		t.Fatal(err)
	}
	return x
}

// difference returns x less a decimal of more digits than a float64 has.
func difference(t *testing.T, x float64, decimal string) float64 {
	t.Helper()
	y, _, err := big.ParseFloat(decimal, 10, 120, big.ToNearestEven)
	if err != nil {
		t.Fatal(err)
	}
	d, _ := y.Sub(big.NewFloat(x), y).Float64()
	return d
}

func tableLinkage(t *testing.T, row []string) (*fourbar.Linkage, rigid.Coordinate, rigid.Side) {
	t.Helper()
	var x [8]float64
	for i := range x {
		x[i] = number(t, row[3+i])
	}
	d := fourbar.Dimensions{Frame: x[0], Crank: x[1], Coupler: x[2], Follower: x[3], Mount: rigid.Placement{Angle: x[4]}}
	if err := d.Branch.UnmarshalText([]byte(row[1])); err != nil {
		t.Fatal(err)
	}
	l, err := fourbar.New(d)
	if err != nil {
		t.Fatal(err)
	}
	var side rigid.Side
	if err := side.UnmarshalText([]byte(row[2])); err != nil {
		t.Fatal(err)
	}
	return l, rigid.Coordinate{Pos: x[5], Vel: x[6], Acc: x[7]}, side
}
