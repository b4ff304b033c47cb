package planar_test

import (
	"iter"
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// pressFeeder is the feeder's four-bar, its rocker and a coupler point measured.
func pressFeeder() Design {
	var p plan
	l := p.links("crank", "coupler", "rocker")
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	p.pin(l[0].At(0.08, 0), l[1].At(0, 0))
	p.pin(l[1].At(0.26, 0), l[2].At(0.18, 0))
	p.pin(Frame.At(0.24, 0), l[2].At(0, 0))
	p.turn(l[0], Frame)
	return p.Design
}

func feederGuess() []rigid.Placement {
	return []rigid.Placement{{}, {}, {X: 0.08, Angle: 0.8}, {X: 0.24, Angle: 1.6}}
}

// lengths are the feeder's but for the distance of the pivots.
func lengths(d *Design) []Dimension {
	return []Dimension{d.Hole(Link(1).At(0.08, 0), X), d.Hole(Link(2).At(0.26, 0), X), d.Hole(Link(3).At(0.18, 0), X)}
}

// built returns the machine with its dimensions off, put together at a state's place.
func built(t testing.TB, d Design, guess []rigid.Placement, by []Dimension, off []float64, in ...rigid.Coordinate) *State {
	t.Helper()
	for i, m := range by {
		var err error
		if d, err = d.With(m, off[i]); err != nil {
			t.Fatal(err)
		}
	}
	_, st := assemble(t, d, guess, in...)
	return st
}

// record moves a machine through n places of one turn and reads outputs with noise.
func record(t testing.TB, st *State, n int, outputs []Drive, noise []float64, random *rand.Rand) []Sample {
	t.Helper()
	log := make([]Sample, n)
	first := st.Inputs()[0].Pos
	for i := range log {
		in := first + 2*math.Pi*float64(i)/float64(n)
		if err := st.Move(rigid.Coordinate{Pos: in}); err != nil {
			t.Fatal(err)
		}
		log[i].In = []float64{in}
		for k, o := range outputs {
			log[i].Out = append(log[i].Out, value(st, o).Pos+noise[k]*random.NormFloat64())
		}
	}
	return log
}

func played(log []Sample) iter.Seq2[Sample, error] {
	return func(yield func(Sample, error) bool) {
		for _, s := range log {
			if !yield(s, nil) {
				return
			}
		}
	}
}

// TestCalibrateRecovers makes logs of machines with dimensions off at random, and
// finds them again: three standard deviations hold 99.7 % of normal errors.
func TestCalibrateRecovers(t *testing.T) {
	logs := 400
	if testing.Short() {
		logs = 60
	}
	d := pressFeeder()
	in := at(0.3)
	_, nominal := assemble(t, d, feederGuess(), in)
	rocker := Turn{Of: 3, From: Frame}
	noise := []float64{2e-5}
	by := append(lengths(&d), d.Zero(0), d.Zero(1))
	random := rand.New(rand.NewPCG(5, 8))
	good, inside, all := 0, 0, 0
	for range logs {
		off := make([]float64, len(by))
		for i := range off {
			off[i] = 4e-4 * random.NormFloat64()
		}
		log := record(t, built(t, d, feederGuess(), by[:3], off[:3], in), 70, []Drive{rocker}, noise, random)
		for i := range log {
			log[i].In[0] -= off[3] // the zero is what must be added
			log[i].Out[0] -= off[4]
		}
		c, err := nominal.Calibrate(played(log), Calibration{Outputs: []Drive{rocker}, By: by, Noise: noise})
		if err != nil {
			t.Fatal(err)
		}
		if len(c.Alike) > 0 || !c.Converged || c.Readings != 70 || math.Abs(c.RMS-1) > 0.45 {
			t.Fatalf("%+v", c)
		}
		ok := true
		for i := range by {
			all++
			if math.Abs(c.Change[i]-off[i]) <= 3*c.Deviation(i) {
				inside++
			} else {
				ok = false
			}
		}
		if ok {
			good++
		}
	}
	t.Logf("%d of %d logs, %d of %d dimensions within three standard deviations", good, logs, inside, all)
	if float64(good) < 0.95*float64(logs) {
		t.Errorf("%d of %d logs", good, logs)
	}
	if inside == all && logs > 300 {
		t.Error("none is off by more than three standard deviations: they are too large")
	}
}

// TestCalibrateParallelogram: with both cranks longer by as much, or frame and
// coupler, a parallelogram stays one, and the far crank turns as before.
func TestCalibrateParallelogram(t *testing.T) {
	d := parallelogram(0.1, 0.3)
	guess := []rigid.Placement{{}, {Angle: 0.4}, {X: 0.09, Y: 0.04}, {X: 0.3, Angle: 0.4}}
	_, st := assemble(t, d, guess, at(0.4))
	far := Turn{Of: 3, From: Frame}
	random := rand.New(rand.NewPCG(1, 1))
	var log []Sample
	for i := range 200 {
		in := 0.4 + 2.3*float64(i)/200
		log = append(log, Sample{In: []float64{in}, Out: []float64{in + 1e-5*random.NormFloat64()}})
	}
	by := []Dimension{
		d.Hole(Link(1).At(0.1, 0), X), d.Hole(Frame.At(0.3, 0), X), d.Hole(Link(3).At(0.1, 0), X), d.Hole(Link(2).At(0.3, 0), X),
	}
	c, err := st.Calibrate(played(log), Calibration{Outputs: []Drive{far}, By: by})
	if err != nil {
		t.Fatal(err)
	}
	if !slices.EqualFunc(c.Alike, [][]int{{0, 2}, {1, 3}}, slices.Equal[[]int]) {
		t.Errorf("alike: %v", c.Alike)
	}
	for i := range by {
		if !math.IsInf(c.Deviation(i), 1) || math.Abs(c.Change[i]) > 1e-5 {
			t.Errorf("%d: %g ± %g", i, c.Change[i], c.Deviation(i))
		}
	}
	if math.Abs(c.RMS/1e-5-1) > 0.3 {
		t.Errorf("residual %g", c.RMS)
	}
	// What can be found, by turning the pairs into one dimension each.
	c, err = st.Calibrate(played(log), Calibration{Outputs: []Drive{far}, By: []Dimension{by[0], by[1]}})
	if err != nil || len(c.Alike) > 0 || !(c.Deviation(0) < 1e-6) || math.Abs(c.Correlation(0, 1)) > 0.99 {
		t.Errorf("one of each: %+v, %v", c, err)
	}
}

// TestCalibrateOutliers spoils one reading in ten, and finds the same.
func TestCalibrateOutliers(t *testing.T) {
	d := pressFeeder()
	_, nominal := assemble(t, d, feederGuess(), at(0.3))
	rocker := Turn{Of: 3, From: Frame}
	by := append(lengths(&d), d.Zero(1))
	random := rand.New(rand.NewPCG(3, 3))
	off := []float64{4e-4, -3e-4, 5e-4, 0}
	log := record(t, built(t, d, feederGuess(), by[:3], off[:3], at(0.3)), 500, []Drive{rocker}, []float64{2e-5}, random)
	spoilt := 0
	for i := range log {
		if i%10 == 3 {
			log[i].Out[0] += 0.02 + 0.3*random.Float64()
			spoilt++
		}
	}
	c, err := nominal.Calibrate(played(log), Calibration{Outputs: []Drive{rocker}, By: by, Noise: []float64{2e-5}, Outliers: 0.15})
	if err != nil {
		t.Fatal(err)
	}
	if c.Outliers < spoilt || c.Outliers > spoilt+5 || c.Readings != 500-c.Outliers || math.Abs(c.RMS-1) > 0.15 {
		t.Errorf("%d outliers of %d, residual %g", c.Outliers, spoilt, c.RMS)
	}
	for i := range by {
		if math.Abs(c.Change[i]-off[i]) > 3.5*c.Deviation(i) {
			t.Errorf("%d: %g ± %g, not %g", i, c.Change[i], c.Deviation(i), off[i])
		}
	}
}

// TestCalibrateMounted finds a slide's sensor that is mounted askew and elsewhere,
// with a reach and a turn beside it.
func TestCalibrateMounted(t *testing.T) {
	d := pressFeeder()
	_, nominal := assemble(t, d, feederGuess(), at(0.3))
	point := Link(2).Line(0.1, 0.05, 0)
	outputs := []Drive{Turn{Of: 2, From: 1}, Slide{Of: point, From: Frame.Line(0.05, 0.02, 0.6)}, Reach{A: Frame.At(-0.1, 0.1), B: Link(2).At(0.1, 0.05)}}
	really := slices.Clone(outputs)
	really[1] = Slide{Of: Link(2).Line(0.1003, 0.0496, 0), From: Frame.Line(0.05, 0.0204, 0.602)}
	really[2] = Reach{A: Frame.At(-0.1005, 0.1002), B: Link(2).At(0.1, 0.05)}
	first := len(d.Joints) + len(d.Drives)
	one := func(output int, end End, part Part) Dimension {
		return Dimension{[]Entry{{first + output, end, part}}}
	}
	by := []Dimension{
		one(1, A, X), one(1, A, Y), one(1, B, Y), one(1, B, Angle), one(2, A, X), one(2, A, Y), one(0, A, Angle),
		one(2, A, Phase), d.Hole(Link(1).At(0.08, 0), X), one(0, B, Angle),
	}
	want := []float64{3e-4, -4e-4, 4e-4, 2e-3, -5e-4, 2e-4, 0.01, -2e-3, 1e-4, 0}
	random := rand.New(rand.NewPCG(4, 4))
	noise := []float64{1e-5, 1e-6, 1e-6}
	log := record(t, built(t, d, feederGuess(), by[8:9], want[8:9], at(0.3)), 300, really, noise, random)
	for i := range log {
		log[i].Out[0] += want[6]
		log[i].Out[2] -= want[7]
		if i%7 == 0 {
			log[i].Out[1] = math.NaN() // missing
		}
	}
	c, err := nominal.Calibrate(played(log), Calibration{Outputs: outputs, By: by, Noise: noise})
	if err != nil {
		t.Fatal(err)
	}
	// The two marks of the turn are one zero. Along and across its line the slide's
	// origin stands for one number of two.
	if !slices.EqualFunc(c.Alike, [][]int{{6, 9}}, slices.Equal[[]int]) {
		t.Errorf("alike: %v", c.Alike)
	}
	if c.Readings != 3*300-43 || math.Abs(c.RMS-1) > 0.1 {
		t.Errorf("%d readings, residual %g", c.Readings, c.RMS)
	}
	for i := range by {
		if i == 6 || i == 9 {
			continue
		}
		if math.Abs(c.Change[i]-want[i]) > 3.5*c.Deviation(i) {
			t.Errorf("%d: %g ± %g, not %g", i, c.Change[i], c.Deviation(i), want[i])
		}
	}
	if off := c.Change[6] - c.Change[9] - want[6]; math.Abs(off) > 1e-5 {
		t.Errorf("the zero of the turn is off by %g", off)
	}
}
