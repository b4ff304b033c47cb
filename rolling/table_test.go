package rolling_test

import (
	"bufio"
	"errors"
	"io"
	"math"
	"os"
	"path/filepath"
	"strconv"
	"strings"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rolling"
)

const eps = 0x1p-52

// lines returns the lines of a table under testdata as fields.
func lines(t *testing.T, name string) [][]string {
	t.Helper()
	f, err := os.Open(filepath.Join("testdata", name))
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	var all [][]string
	r := bufio.NewReader(f)
	for {
		line, err := r.ReadString('\n')
		if line != "" {
			all = append(all, strings.Fields(line))
		}
		if errors.Is(err, io.EOF) {
			return all
		}
		if err != nil {
			t.Fatal(err)
		}
	}
}

func numbers(t *testing.T, fields []string) []float64 {
	t.Helper()
	x := make([]float64, len(fields))
	for i, s := range fields {
		var err error
		if x[i], err = strconv.ParseFloat(s, 64); err != nil {
			t.Fatal(err)
		}
	}
	return x
}

// drive solves a wheel by the mode of a line of wheel.txt.
func drive(w *rolling.Wheel, st *rolling.WheelState, mode string, a, b rigid.Coordinate) error {
	switch mode {
	case "turn":
		return w.Solve(st, a)
	case "travel":
		return w.SolveTravel(st, a)
	case "arc":
		return w.SolveArc(st, a)
	case "slip":
		return w.SolveSlip(st, a, b)
	case "belt":
		return w.SolveBelt(st, a, b)
	}
	return rigid.ErrInput
}

var outputNames = [...]string{
	"axis x", "axis y",
	"centre x", "centre vx", "centre ax", "centre y", "centre vy", "centre ay",
	"contact x", "contact vx", "contact ax", "contact y", "contact vy", "contact ay",
	"turn", "omega", "alpha", "arc", "arc rate", "arc acceleration", "travel", "travel rate", "travel acceleration",
}

func outputs(st *rolling.WheelState) [len(outputNames)]float64 {
	m, c := &st.Wheel, st.Contact
	return [...]float64{
		m.Pose.Axis.X, m.Pose.Axis.Y,
		m.Pose.Origin.X, m.Vel.X, m.Acc.X, m.Pose.Origin.Y, m.Vel.Y, m.Acc.Y,
		c.Pos.X, c.Vel.X, c.Acc.X, c.Pos.Y, c.Vel.Y, c.Acc.Y,
		st.Turn.Pos, m.Omega, m.Alpha, st.Arc.Pos, st.Arc.Vel, st.Arc.Acc, st.Travel.Pos, st.Travel.Vel, st.Travel.Acc,
	}
}

// TestWheelTable compares with 50-digit values made from the closure equations by
// testdata/wheel.py: sizes 1e-6 to 1e3 m, tracks of 1e-4 to 1e4 radii, up to ten
// million turns. The bound is 4 ε (|y| + Σ |x ∂y/∂x|) over all inputs x.
func TestWheelTable(t *testing.T) {
	rows := lines(t, "wheel.txt")
	if len(rows) != 300 {
		t.Fatalf("%d lines", len(rows))
	}
	worst := 0.0
	for i := 0; i < len(rows); i += 2 {
		mode, in, want := rows[i][0], numbers(t, rows[i][1:]), numbers(t, rows[i+1])
		w, err := rolling.NewWheel(rolling.WheelDimensions{Radius: in[0], Ground: in[1]})
		if err != nil {
			t.Fatal(i, err)
		}
		var st rolling.WheelState
		a := rigid.Coordinate{Pos: in[2], Vel: in[3], Acc: in[4]}
		if err := drive(w, &st, mode, a, rigid.Coordinate{Pos: in[5], Vel: in[6], Acc: in[7]}); err != nil {
			t.Fatal(i, err)
		}
		for k, got := range outputs(&st) {
			y, sum := want[2*k], want[2*k+1]
			used := 0.0
			if got != y { // where sum is 0 nothing else will do
				used = math.Abs(got-y) / (eps * sum)
			}
			if worst = max(worst, used); !(used <= 4) {
				t.Errorf("line %d, %s %v: %s %v, want %v: %.2f ε", i+1, mode, in, outputNames[k], got, y, used)
			}
		}
	}
	t.Logf("worst %.2f ε", worst)
}

// TestMillionTurns: after a million turns the centre of a wheel on a circle is where 50
// digits (mpmath) put it for the numbers given, to the rounding of the place alone: the
// angle on the circle, 2.7e6 rad, is kept beyond its own rounding of 2e-10 rad.
func TestMillionTurns(t *testing.T) {
	w := wheel(t, rolling.WheelDimensions{Radius: 0.3, Ground: 0.4})
	turn := rigid.Coordinate{Pos: 6283185.3}
	for _, row := range []struct {
		slip float64
		want r2.Vec
	}{
		{0, r2.Vec{X: -0.30565775187021354978, Y: -1.0297406916514503025}},
		{0.1, r2.Vec{X: -0.39220136755043204751, Y: -0.97980866438125167865}},
	} {
		var st rolling.WheelState
		if err := w.SolveSlip(&st, turn, rigid.Coordinate{Pos: row.slip}); err != nil {
			t.Fatal(err)
		}
		if got := st.Wheel.Pose.Origin; !nearVec(got, row.want, 2*eps) {
			t.Errorf("slip %v: %v, want %v", row.slip, got, row.want)
		}
		if row.slip != 0 {
			continue
		}
		before := st.Wheel.Pose.Origin
		if err := w.Solve(&st, turn); err != nil || !nearVec(st.Wheel.Pose.Origin, before, eps) {
			t.Errorf("%v %v, want %v", st.Wheel.Pose.Origin, err, before)
		}
	}
}

// runs returns how many random cases to try of n.
func runs(n int) int {
	if testing.Short() {
		return n / 5
	}
	return n
}
