package slidercrank_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// A sample is the motion of one mechanism at one instant.
type sample struct {
	links  []rigid.Motion
	coords []rigid.Coordinate // that of the drive first
	margin float64
}

// A machine is one inversion as the property tests see it.
type machine struct {
	solve func(turn rigid.Coordinate) (sample, error)
	back  func(turn rigid.Coordinate) ([]sample, error) // solves forth, then by every way back from the State found
	law   rigid.Law
	over  []rigid.Interval
	dead  []rigid.Coefficients
}

// A maker makes one random machine: to a scale, mirrored in its x axis, mounted.
type maker func(t *testing.T, scale float64, mirror bool, mount rigid.Placement) machine

type named struct {
	name string
	make maker
}

// makers returns one random machine of each kind; every second lever's crank is
// longer than its centre distance.
func makers(rng *rand.Rand) []named {
	r, c := 0.05+0.1*rng.Float64(), 0.17+0.2*rng.Float64()
	if rng.IntN(2) == 0 {
		r, c = c, r
	}
	e := 0.8 * (2*rng.Float64() - 1) * math.Abs(r-c)
	if rng.IntN(4) == 0 {
		e = math.Copysign(math.Abs(r-c)+0.8*rng.Float64()*(r+c-math.Abs(r-c)), e)
	}
	tilt, angle := 2*rng.Float64()-1, math.Copysign(0.4+2.3*rng.Float64(), rng.Float64()-0.5)
	arm, bend, guide := 0.2+0.3*rng.Float64(), 6*rng.Float64()-3, rigid.Placement{X: 0.3 * rng.Float64(), Y: 0.1 * rng.Float64(), Angle: 6 * rng.Float64()}
	length, branch := 1.5+rng.Float64(), slidercrank.Branch(rng.IntN(2))
	if rng.IntN(3) == 0 {
		length = 0
	}
	return []named{
		{"press", pressMaker(slidercrank.Dimensions{Crank: r, Rod: c, Offset: e, Branch: branch})},
		{"lever", leverMaker(slidercrank.LeverDimensions{Crank: r, Centre: c, Slot: e})},
		{"cylinder", cylinderMaker(slidercrank.CylinderDimensions{Crank: r, Centre: c, Offset: e})},
		{"yoke", yokeMaker(slidercrank.YokeDimensions{Crank: r, Tilt: tilt})},
		{"rod", rodMaker(slidercrank.RodDimensions{Length: r, Angle: angle})},
		{"quick return", ramMaker(slidercrank.QuickReturnDimensions{
			Crank: r, Centre: c, Slot: e, Arm: arm, ArmAngle: bend, Rod: length, Branch: branch, Guide: guide,
		})},
	}
}

// sign returns −1 for a mirrored machine, else 1.
func sign(mirror bool) float64 {
	if mirror {
		return -1
	}
	return 1
}

func leverMaker(d slidercrank.LeverDimensions) maker {
	return func(t *testing.T, scale float64, mirror bool, mount rigid.Placement) machine {
		d := d
		d.Crank, d.Centre, d.Slot, d.Mount = scale*d.Crank, scale*d.Centre, sign(mirror)*scale*d.Slot, mount
		l := newLever(t, d)
		of := func(st *slidercrank.LeverState) sample {
			return sample{[]rigid.Motion{st.Crank, st.Block, st.Lever}, []rigid.Coordinate{st.Turn, st.Swing, st.Slide}, st.Margin}
		}
		return machine{
			solve: func(turn rigid.Coordinate) (sample, error) {
				var st slidercrank.LeverState
				err := l.Solve(&st, turn)
				return of(&st), err
			},
			back: func(turn rigid.Coordinate) ([]sample, error) {
				var st, again slidercrank.LeverState
				if err := l.Solve(&st, turn); err != nil {
					return nil, err
				}
				err := l.SolveSwing(&again, st.Swing, st.Knee)
				return []sample{of(&again)}, err
			},
			law: l.Coefficients, over: l.Range(), dead: l.DeadCentres(),
		}
	}
}

func cylinderMaker(d slidercrank.CylinderDimensions) maker {
	return func(t *testing.T, scale float64, mirror bool, mount rigid.Placement) machine {
		d := d
		d.Crank, d.Centre, d.Offset, d.Mount = scale*d.Crank, scale*d.Centre, sign(mirror)*scale*d.Offset, mount
		c, err := slidercrank.NewOscillatingCylinder(d)
		if err != nil {
			t.Fatal(err)
		}
		of := func(st *slidercrank.CylinderState) sample {
			return sample{[]rigid.Motion{st.Crank, st.Rod, st.Cylinder}, []rigid.Coordinate{st.Turn, st.Slide, st.Swing}, st.Margin}
		}
		return machine{
			solve: func(turn rigid.Coordinate) (sample, error) {
				var st slidercrank.CylinderState
				err := c.Solve(&st, turn)
				return of(&st), err
			},
			back: func(turn rigid.Coordinate) ([]sample, error) {
				var st, again slidercrank.CylinderState
				if err := c.Solve(&st, turn); err != nil {
					return nil, err
				}
				err := c.SolveSlide(&again, st.Slide, st.Knee)
				return []sample{of(&again)}, err
			},
			law: c.Coefficients, over: c.Range(), dead: c.DeadCentres(),
		}
	}
}

func yokeMaker(d slidercrank.YokeDimensions) maker {
	return func(t *testing.T, scale float64, mirror bool, mount rigid.Placement) machine {
		d := d
		d.Crank, d.Tilt, d.Mount = scale*d.Crank, sign(mirror)*d.Tilt, mount
		y, err := slidercrank.NewScotchYoke(d)
		if err != nil {
			t.Fatal(err)
		}
		of := func(st *slidercrank.YokeState) sample {
			return sample{[]rigid.Motion{st.Crank, st.Block, st.Yoke}, []rigid.Coordinate{st.Turn, st.Slide, st.Run}, st.Margin}
		}
		return machine{
			solve: func(turn rigid.Coordinate) (sample, error) {
				var st slidercrank.YokeState
				err := y.Solve(&st, turn)
				return of(&st), err
			},
			back: func(turn rigid.Coordinate) ([]sample, error) {
				var st, again slidercrank.YokeState
				if err := y.Solve(&st, turn); err != nil {
					return nil, err
				}
				err := y.SolveSlide(&again, st.Slide, st.Knee)
				return []sample{of(&again)}, err
			},
			law: y.Coefficients, over: y.Range(), dead: y.DeadCentres(),
		}
	}
}

func rodMaker(d slidercrank.RodDimensions) maker {
	return func(t *testing.T, scale float64, mirror bool, mount rigid.Placement) machine {
		d := d
		d.Length, d.Angle, d.Mount = scale*d.Length, sign(mirror)*d.Angle, mount
		s := newRod(t, d)
		of := func(st *slidercrank.RodState) sample {
			return sample{[]rigid.Motion{st.Rod, st.A, st.B}, []rigid.Coordinate{st.Turn, st.SlideB, st.SlideA}, st.Margin}
		}
		return machine{
			solve: func(turn rigid.Coordinate) (sample, error) {
				var st slidercrank.RodState
				err := s.Solve(&st, turn)
				return of(&st), err
			},
			back: func(turn rigid.Coordinate) ([]sample, error) {
				var st, byA, byB slidercrank.RodState
				if err := s.Solve(&st, turn); err != nil {
					return nil, err
				}
				if err := s.SolveA(&byA, st.SlideA, st.KneeA); err != nil {
					return nil, err
				}
				err := s.SolveB(&byB, st.SlideB, st.KneeB)
				return []sample{of(&byA), of(&byB)}, err
			},
			law: s.Coefficients, over: s.Range(), dead: s.DeadCentres(),
		}
	}
}

func ramMaker(d slidercrank.QuickReturnDimensions) maker {
	return func(t *testing.T, scale float64, mirror bool, mount rigid.Placement) machine {
		d := d
		d.Crank, d.Centre, d.Slot, d.Mount = scale*d.Crank, scale*d.Centre, sign(mirror)*scale*d.Slot, mount
		d.Arm, d.ArmAngle, d.Rod = scale*d.Arm, sign(mirror)*d.ArmAngle, scale*d.Rod
		d.Guide = rigid.Placement{X: scale * d.Guide.X, Y: sign(mirror) * scale * d.Guide.Y, Angle: sign(mirror) * d.Guide.Angle}
		q := newQuickReturn(t, d)
		of := func(st *slidercrank.QuickReturnState) sample {
			return sample{
				[]rigid.Motion{st.Crank, st.Block, st.Lever, st.Rod, st.Ram},
				[]rigid.Coordinate{st.Turn, st.Travel, st.Swing, st.Slide}, st.Margin,
			}
		}
		return machine{
			solve: func(turn rigid.Coordinate) (sample, error) {
				var st slidercrank.QuickReturnState
				err := q.Solve(&st, turn)
				return of(&st), err
			},
			back: func(turn rigid.Coordinate) ([]sample, error) {
				var st, again slidercrank.QuickReturnState
				if err := q.Solve(&st, turn); err != nil {
					return nil, err
				}
				err := q.SolveTravel(&again, st.Travel, st.Elbow, st.Knee)
				return []sample{of(&again)}, err
			},
			law: q.Coefficients, over: q.Range(), dead: q.DeadCentres(),
		}
	}
}

// outcome runs a solver on a state and checks that it returns the very error
// wanted, that an error leaves the state as it was, and that it allocates nothing
// either way. It returns the state.
func outcome[S comparable](t *testing.T, name string, before S, run func(*S) error, want error) S {
	t.Helper()
	st := before
	err := run(&st)
	if err != want {
		t.Errorf("%s: %v, want %v", name, err, want)
	}
	if (err != nil) != (st == before) {
		t.Errorf("%s: %v, and the state is %+v", name, err, st)
	}
	again := st
	if n := testing.AllocsPerRun(20, func() { _ = run(&again) }); n != 0 {
		t.Errorf("%s: %v allocations", name, n)
	}
	return st
}
