package planar_test

import (
	"errors"
	"math"
	"math/rand/v2"
	"runtime"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

func at(pos float64) rigid.Coordinate { return rigid.Coordinate{Pos: pos} }

func unit(pos float64) rigid.Coordinate { return rigid.Coordinate{Pos: pos, Vel: 1} }

func assemble(t testing.TB, d Design, guess []rigid.Placement, in ...rigid.Coordinate) (*Linkage, *State) {
	t.Helper()
	l, err := New(d)
	if err != nil {
		t.Fatal(err)
	}
	s, err := l.Assemble(guess, in...)
	if err != nil {
		t.Fatal(err)
	}
	return l, s
}

// far returns how far apart two states are: origins, and axes.
func far(l *Linkage, a, b *State) float64 {
	worst := 0.0
	for i := range l.Design().Links {
		p, q := a.Motion(Link(i)).Pose, b.Motion(Link(i)).Pose
		worst = max(worst, r2.Norm(r2.Sub(p.Origin, q.Origin)), r2.Norm(r2.Sub(p.Axis, q.Axis)))
	}
	return worst
}

// TestLimit drives a rocker of a crank-rocker up to its extreme position and back:
// there the place is given and the rates are refused; beyond it nothing is; back the
// linkage stays on its side.
func TestLimit(t *testing.T) {
	const a, b, c, d = 0.4, 1.2, 0.8, 1.0
	l := fourBarOf(t, a, b, c, d)
	var p plan
	p.Design = l.Design()
	p.Drives = []Drive{Turn{Of: 3, From: Frame}}
	// the crank pin's distance |O2 B| is a + b where crank and coupler are in line
	limit := math.Acos((d*d + c*c - (a+b)*(a+b)) / (2 * d * c))
	limit = math.Pi - limit - 4e-15
	l, err := New(p.Design)
	if err != nil {
		t.Fatal(err)
	}
	s, err := l.AssembleMode(".+", at(limit+0.6))
	if err != nil {
		t.Fatal(err)
	}
	before := s.Clone()
	if err := s.Move(at(limit)); err != nil {
		t.Fatalf("to the limit: %v", err)
	}
	if m := s.Margin(); m > 1e-7 {
		t.Errorf("margin %v at the limit", m)
	}
	if o := open(l, s, []rigid.Coordinate{at(limit)}); !(o.pos < 1e-14) {
		t.Errorf("at the limit: %+v", o)
	}
	stopped := s.Clone()
	if err := s.Move(unit(limit)); !errors.Is(err, rigid.ErrSingular) {
		t.Errorf("rates at the limit: %v", err)
	}
	err = s.Move(unit(limit - 0.1))
	if !errors.Is(err, rigid.ErrUnreachable) {
		t.Errorf("beyond the limit: %v", err)
	}
	stop, ok := s.Stop()
	if !ok || stop.Err != err || stop.Group != 1 || stop.Done > 1e-6 || !(stop.Gap > 1e-4) {
		t.Errorf("beyond the limit: %+v, %v", stop, ok)
	}
	if far(l, s, stopped) != 0 {
		t.Errorf("moved by Moves that failed")
	}
	if err := s.Move(at(limit + 0.3)); err != nil {
		t.Fatalf("back: %v", err)
	}
	if err := s.Move(at(limit - 0.3)); !errors.Is(err, rigid.ErrUnreachable) {
		t.Errorf("beyond the limit: %v", err)
	}
	if stop, ok := s.Stop(); !ok || !(math.Abs(stop.Done-0.5) < 1e-7) {
		t.Errorf("half way: %+v, %v", stop, ok)
	}
	if err := s.Move(at(limit + 0.6)); err != nil {
		t.Fatalf("back: %v", err)
	}
	if gap := far(l, s, before); gap > 1e-14 {
		t.Errorf("%v from where it was", gap)
	}
	if _, ok := s.Stop(); ok {
		t.Error("Stop after a Move that went well")
	}
}

// TestNoAllocation counts the allocations of hot calls, those that fail included.
func TestNoAllocation(t *testing.T) {
	cases, _ := peers(t)
	p := cases["sixbar_watt"]
	l, guess := p.linkage(t)
	s, err := l.Assemble(guess, p.input(0))
	if err != nil {
		t.Fatal(err)
	}
	c := s.Clone()
	k := 0
	none := func(name string, f func()) {
		if n := testing.AllocsPerRun(100, f); n != 0 {
			t.Errorf("%s: %v allocations", name, n)
		}
	}
	var point rigid.Point
	none("Move", func() { k++; _ = s.Move(p.input(k)) })
	none("Move by 2 rad", func() { k += 1000; _ = s.Move(p.input(k)) })
	none("Move of NaN", func() { _ = s.Move(at(math.NaN())) })
	none("Move too far", func() { _ = s.Move(at(1e6)) })
	none("Move without input", func() { _ = s.Move() })
	none("Set", func() { _ = c.Set(s) })
	none("Point", func() { point = s.Point(Link(2).At(1, 2)) })
	none("Turn, Slide, Margin", func() {
		_ = s.Turn(3, 2)
		_ = s.Slide(Link(3).Line(0, 0, 1), Link(1).Line(1, 0, 0))
		_ = s.Margin()
	})
	none("Pole, terms", func() {
		_, _ = s.Pole(2, 3)
		_ = s.AccelerationTerms(Link(2).At(1, 2), 3)
	})
	_ = point
	bar := fourBarOf(t, 1, 1, 1, 2.5)
	f, err := bar.AssembleMode(".+", at(0.5))
	if err != nil {
		t.Fatal(err)
	}
	none("Move beyond a limit", func() {
		if f.Move(unit(2)) == nil {
			t.Fatal("reached")
		}
	})
	if err := f.Move(at(0.8)); err != nil {
		t.Fatal(err)
	}
	none("Move of one step beyond a limit", func() {
		if f.Move(unit(0.95)) == nil {
			t.Fatal("reached")
		}
	})
}

// TestDrift takes a million steps around the cycle and as many back.
func TestDrift(t *testing.T) {
	cases, _ := peers(t)
	p := cases["sixbar_steph"]
	l, guess := p.linkage(t)
	s, err := l.Assemble(guess, p.input(0))
	if err != nil {
		t.Fatal(err)
	}
	first := s.Clone()
	n := 1_000_000
	if testing.Short() {
		n = 20_000
	}
	step := func(k int) { // steps that are exact in binary
		if err := s.Move(at(float64(k) / 128)); err != nil {
			t.Fatal(err)
		}
	}
	for k := range n {
		step(k)
	}
	for k := n; k >= 0; k-- {
		step(k)
	}
	if gap := far(l, s, first); gap > 1e-12 {
		t.Errorf("%v from where it started", gap)
	}
	if a, b := s.Turn(5, 2), first.Turn(5, 2); math.Abs(a.Pos-b.Pos) > 1e-12 {
		t.Errorf("turn %v, %v at first", a.Pos, b.Pos)
	}
}

// TestMemory measures what a Linkage and its State take: at most 2 KiB a link.
func TestMemory(t *testing.T) {
	cases, _ := peers(t)
	heap := func() float64 {
		var m runtime.MemStats
		runtime.GC()
		runtime.GC() // also what finalizers let go
		runtime.ReadMemStats(&m)
		return float64(m.HeapAlloc)
	}
	before := heap()
	l, guess := cases["chain330"].linkage(t)
	s, err := l.Assemble(guess, at(0))
	if err != nil {
		t.Fatal(err)
	}
	if per := (heap() - before) / float64(len(guess)); !(per > 0 && per <= 2048) {
		t.Errorf("%.0f bytes a link", per)
	}
	runtime.KeepAlive(cases)
	runtime.KeepAlive(l)
	runtime.KeepAlive(s)
}

// TestGrownMoves drives random linkages by Moves of many sizes, forth and back. A
// Move that succeeds must end where a trace in small steps ends, and one that fails
// leaves the State as it was, where the trace stops or turns singular too.
func TestGrownMoves(t *testing.T) {
	random := rand.New(rand.NewPCG(5, 5))
	linkages := 150
	if testing.Short() {
		linkages = 15
	}
	moved, stopped, grazed, disputed := 0, 0, 0, 0
	for n := range linkages {
		g := grow(uint64(1000+n), random.IntN(growths), random.IntN(growths), random.IntN(growths))
		l, err := New(g.Design)
		if err != nil {
			t.Fatal(err)
		}
		s, err := l.Assemble(g.guess(), g.in...)
		if err != nil {
			t.Errorf("linkage %d: %v", n, err)
			continue
		}
		for range 12 {
			trace := s.Clone()
			from := trace.Inputs()
			to := trace.Inputs()
			h := math.Pow(10, -1.5+2*random.Float64())
			for i := range to {
				to[i].Pos += h * (2*random.Float64() - 1)
			}
			err := s.Move(to...)
			was := trace.Clone()
			steps := int(h*400) + 40
			var blocked error
			for k := 1; k <= steps && blocked == nil; k++ {
				in := make([]rigid.Coordinate, len(to))
				for i := range in {
					in[i].Pos = from[i].Pos + float64(k)/float64(steps)*(to[i].Pos-from[i].Pos)
				}
				if k == steps {
					copy(in, to)
				}
				blocked = trace.Move(in...)
			}
			switch {
			case err == nil && blocked == nil:
				moved++
				if gap := far(l, s, trace); !(gap < 1e-9/s.Margin()) {
					t.Errorf("linkage %d: a Move ends %.3g from its trace, margin %.2g", n, gap, s.Margin())
				}
				if o := open(l, s, to); !(o.pos < 1e-12/s.Margin()) {
					t.Errorf("linkage %d: %+v", n, o)
				}
			case err != nil && blocked != nil:
				stopped++
				if far(l, s, was) != 0 {
					t.Errorf("linkage %d: moved by a Move that failed", n)
				}
			case errors.Is(err, ErrTooFar) || errors.Is(blocked, ErrTooFar):
				stopped++
			case err == nil && narrow(trace):
				grazed++
			default:
				disputed++
				t.Logf("linkage %d: Move says %v, trace %v, margin %.2g", n, err, blocked, trace.Margin())
			}
		}
	}
	if disputed > 0 {
		t.Errorf("%d disputed", disputed)
	}
	t.Logf("%d moved, %d stopped, %d passed where a loop fails to close by below 1e-5", moved, stopped, grazed)
}

// narrow reports whether the last Move was stopped by a loop that nearly closes.
func narrow(s *State) bool {
	stop, ok := s.Stop()
	return ok && stop.Gap < 1e-5
}
