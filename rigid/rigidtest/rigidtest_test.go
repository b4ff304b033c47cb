package rigidtest_test

import (
	"math"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rigid/rigidtest"
)

var both = cmp.Options{rigidtest.Lengths(tolerance), rigidtest.Angles(tolerance)}

// differ collects the paths that a comparison finds different, and those of all
// numbers that no comparer looked at.
type differ struct {
	path       cmp.Path
	off, exact []string
	seen       int
}

func (d *differ) PushStep(s cmp.PathStep) { d.path = append(d.path, s) }
func (d *differ) PopStep()                { d.path = d.path[:len(d.path)-1] }
func (d *differ) Report(r cmp.Result) {
	if !r.Equal() {
		d.off = append(d.off, d.path.GoString())
	}
	if d.path.Last().Type().String() == "float64" && !r.ByFunc() {
		d.exact = append(d.exact, d.path.GoString())
	}
	if r.ByFunc() {
		d.seen++
	}
}

func compare(x, y any, opts ...cmp.Option) *differ {
	var d differ
	cmp.Equal(x, y, append(opts, cmp.Reporter(&d))...)
	return &d
}

func TestEachNumberIsComparedAlone(t *testing.T) {
	for _, r := range rows() {
		within, beyond, none := newState(), newState(), newState()
		*r.number(within) += 0.9 * r.slack
		*r.number(beyond) += 1.1 * r.slack
		*r.number(none) = math.NaN()
		if diff := cmp.Diff(newState(), within, both); diff != "" {
			t.Errorf("%s within the tolerance: %s", r.name, diff)
		}
		if d := compare(newState(), beyond, both); len(d.off) != 1 {
			t.Errorf("%s beyond the tolerance: %d numbers off: %v", r.name, len(d.off), d.off)
		}
		if d := compare(none, none, both); len(d.off) != 1 {
			t.Errorf("%s NaN: %d numbers off: %v", r.name, len(d.off), d.off)
		}
		// the option that does not cover the number leaves it exact
		mine, others := rigidtest.Lengths(tolerance), rigidtest.Angles(tolerance)
		if r.angles {
			mine, others = others, mine
		}
		if d := compare(newState(), within, mine); len(d.off) != 0 {
			t.Errorf("%s is not covered by its option: %v", r.name, d.off)
		}
		if d := compare(newState(), within, others); len(d.off) != 1 {
			t.Errorf("%s is covered by the other option too", r.name)
		}
	}
}

// Every number of the state is covered, but the one of a struct of the caller's
// own that no name tells about; each option covers part of them, both the sum.
func TestEveryNumberIsCoveredOnce(t *testing.T) {
	all := compare(newState(), newState(), both)
	if len(all.exact) != 1 || !strings.Contains(all.exact[0], "Drive.Time") {
		t.Errorf("compared exactly: %v; want Drive.Time alone", all.exact)
	}
	l := compare(newState(), newState(), rigidtest.Lengths(tolerance)).seen
	a := compare(newState(), newState(), rigidtest.Angles(tolerance)).seen
	if l+a != all.seen || l < 90 || a < 30 {
		t.Errorf("%d lengths + %d angles, %d together", l, a, all.seen)
	}
}

func TestList(t *testing.T) {
	near := newState()
	near.Arc.Vel += 0.005
	near.Train["arm"] = rigid.Coordinate{Pos: 2, Vel: 4.005, Acc: 6}
	near.Ratio.First += 0.005
	loose, strict := tolerance, rigidtest.Tolerance{}
	names := []string{"Arc", "arm", "Ratio"}
	if d := compare(newState(), near, rigidtest.Lengths(strict, names...), rigidtest.Angles(loose, names...)); len(d.off) != 0 {
		t.Errorf("fields in the list are not angles: %v", d.off)
	}
	near = newState()
	near.Turn.Vel += 0.005
	if d := compare(newState(), near, rigidtest.Lengths(loose, names...), rigidtest.Angles(strict, names...)); len(d.off) != 0 {
		t.Errorf("a list does not replace the default: %v", d.off)
	}
	near = newState()
	near.Train["Turn"] = rigid.Coordinate{Pos: 3, Vel: 6.005, Acc: 9}
	if d := compare(newState(), near, rigidtest.Lengths(strict), rigidtest.Angles(loose)); len(d.off) != 0 {
		t.Errorf("a key of a map does not name an angle: %v", d.off)
	}
}

func TestExact(t *testing.T) {
	other := newState()
	other.Knee = rigid.Left
	if d := compare(newState(), other, both); len(d.off) != 1 {
		t.Errorf("knee: %v", d.off)
	}
}

func TestDirections(t *testing.T) {
	at := func(angle, length float64) rigid.Motion {
		var m rigid.Motion
		m.Pose.Axis = r2.Vec{X: length * math.Cos(angle), Y: length * math.Sin(angle)}
		return m
	}
	only := rigidtest.Tolerance{Relative: 1e-9}
	for _, c := range []struct {
		why  string
		x, y any
		tol  rigidtest.Tolerance
		same bool
	}{
		{"across the cut at half a turn", at(math.Pi-4e-4, 1), at(-math.Pi+4e-4, 1), tolerance, true},
		{"too far across the cut", at(math.Pi-6e-4, 1), at(-math.Pi+6e-4, 1), tolerance, false},
		{"opposite", at(1, 1), at(1+math.Pi, 1), tolerance, false},
		{"a zero axis is (1, 0)", rigid.Motion{}, at(0, 1), rigidtest.Tolerance{}, true},
		{"a zero axis is not (0, 1)", rigid.Motion{}, at(math.Pi/2, 1), tolerance, false},
		{"not a unit vector", at(1, 1), at(1, 1.1), tolerance, false},
		{"not a unit vector, upright", at(math.Pi/2, 1), at(math.Pi/2, 1.1), tolerance, false},
		{"near a unit vector", at(1, 1), at(1, 1.0005), tolerance, true},
		{"a normal a little turned", rigid.Path{Normal: r2.Vec{Y: 1}}, rigid.Path{Normal: r2.Vec{X: 5e-4, Y: 1}}, rigidtest.Tolerance{Pos: 1e-3}, true},
		{"a normal turned by more", rigid.Path{Normal: r2.Vec{Y: 1}}, rigid.Path{Normal: r2.Vec{X: 2e-3, Y: 1}}, rigidtest.Tolerance{Pos: 1e-3}, false},
		{"Relative counts in rad", at(0, 1), at(5e-10, 1), only, true},
		{"Relative exceeded", at(0, 1), at(2e-9, 1), only, false},
		{"NaN", at(math.NaN(), 1), at(math.NaN(), 1), tolerance, false},
		{"infinite", at(1, math.Inf(1)), at(1, math.Inf(1)), tolerance, false},
		{"a path without a direction", rigid.Path{}, rigid.Path{}, tolerance, true},
		{"a tangent missing", rigid.Path{Tangent: r2.Vec{X: 1}}, rigid.Path{}, tolerance, false},
		{"a placement turned once more", rigid.Placement{Angle: 1}, rigid.Placement{Angle: 1 + rigid.Revolution}, tolerance, true},
		{"a turn lost is an error", struct{ Turn rigid.Coordinate }{coordinate(1)},
			struct{ Turn rigid.Coordinate }{rigid.Coordinate{Pos: 1 + rigid.Revolution, Vel: 2, Acc: 3}}, tolerance, false},
	} {
		d := compare(c.x, c.y, rigidtest.Lengths(c.tol), rigidtest.Angles(c.tol))
		if c.same != (len(d.off) == 0) {
			t.Errorf("%s: off %v, want equal %v", c.why, d.off, c.same)
		}
		if back := compare(c.y, c.x, rigidtest.Lengths(c.tol), rigidtest.Angles(c.tol)); len(back.off) != len(d.off) {
			t.Errorf("%s: not symmetric: %v, %v", c.why, d.off, back.off)
		}
	}
}

func TestNumbers(t *testing.T) {
	inf := math.Inf(1)
	for _, c := range []struct {
		why  string
		x, y float64
		tol  rigidtest.Tolerance
		same bool
	}{
		{"zero tolerance, equal", 1, 1, rigidtest.Tolerance{}, true},
		{"zero tolerance, one unit apart", 1, math.Nextafter(1, 2), rigidtest.Tolerance{}, false},
		{"signs of zero", 0, math.Copysign(0, -1), rigidtest.Tolerance{}, true},
		{"relative to the greater", 1000, 1000.009, rigidtest.Tolerance{Relative: 1e-5}, true},
		{"beyond the relative", 1000, 1000.02, rigidtest.Tolerance{Relative: 1e-5}, false},
		{"the greater of both tolerances", 1000, 1000.02, rigidtest.Tolerance{Pos: 0.1, Relative: 1e-5}, true},
		{"the absolute end is included", 0, 0.5, rigidtest.Tolerance{Pos: 0.5}, true},
		{"infinite on both sides", inf, inf, tolerance, true},
		{"infinities of two signs", inf, -inf, rigidtest.Tolerance{Pos: inf, Relative: inf}, false},
		{"infinite and not", inf, 1, rigidtest.Tolerance{Relative: 1}, false},
		{"infinite tolerance", -1e300, 1e300, rigidtest.Tolerance{Pos: inf}, true},
		{"infinite tolerance, NaN", math.NaN(), math.NaN(), rigidtest.Tolerance{Pos: inf, Relative: inf}, false},
		{"NaN tolerance", 1, 2, rigidtest.Tolerance{Pos: math.NaN(), Relative: math.NaN()}, false},
	} {
		x, y := rigid.Coordinate{Pos: c.x}, rigid.Coordinate{Pos: c.y}
		if got := cmp.Equal(x, y, rigidtest.Lengths(c.tol)); got != c.same {
			t.Errorf("%s: %v and %v: %v, want %v", c.why, c.x, c.y, got, c.same)
		}
	}
}

// A normal is a direction: Angles alone must find it so.
func TestNormalIsAnAngle(t *testing.T) {
	x, y := rigid.Path{Normal: r2.Vec{Y: 1}}, rigid.Path{Normal: r2.Vec{X: 5e-4, Y: 1}}
	if diff := cmp.Diff(x, y, rigidtest.Angles(tolerance)); diff != "" {
		t.Error(diff)
	}
	if cmp.Equal(x, y, rigidtest.Lengths(tolerance)) {
		t.Error("Lengths covers a direction")
	}
}

// What is not of the library may have an option of the caller's own beside ours.
func TestCallersOwn(t *testing.T) {
	type sample struct {
		Time float64
		Ram  rigid.Coordinate
	}
	own := cmp.FilterPath(func(p cmp.Path) bool { return p.Last().String() == ".Time" },
		cmp.Comparer(func(x, y float64) bool { return math.Abs(x-y) < 1 }))
	x, y := sample{1, coordinate(1)}, sample{1.5, coordinate(1)}
	if cmp.Equal(x, y, both) {
		t.Error("a time is not ours to compare")
	}
	if diff := cmp.Diff(x, y, both, own); diff != "" {
		t.Error(diff)
	}
}
