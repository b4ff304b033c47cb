package planar_test

import (
	"encoding/json"
	"errors"
	"math"
	"strings"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/planar/planartest"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// TestSpool runs a belt over many turns of its spool and back: whole turns count.
func TestSpool(t *testing.T) {
	l := mustNew(t, wound(nil))
	if got := l.String(); got != "spool, class 1; slider, class 1" {
		t.Error(got)
	}
	s := mustAssemble(t, l, []rigid.Placement{{}, {Y: 0.3}, {X: 0.1}}, at(0))
	const k = 0.002 / (4 * math.Pi)
	for i := range 500 {
		phi := 60 * math.Sin(float64(i)*0.02)
		in := rigid.Coordinate{Pos: phi, Vel: 3, Acc: -2}
		if err := s.Move(in); err != nil {
			t.Fatal(phi, err)
		}
		d := -(0.1 + 2*k*phi)
		follows(t, "slider", s.Slide(Link(2).Line(0, 0, 0), Frame.Line(0, 0, 0)),
			rigid.Coordinate{Pos: -0.1*phi - k*phi*phi, Vel: 3 * d, Acc: -2*d - 2*k*9}, 1e-14, 1e-14, 1e-13)
	}
	if err := planartest.Check(spool{1, 2, 0.1, 0.002}, planartest.Settings{}); err != nil {
		t.Error(err)
	}
}

// TestSeveralEquations ties a link that nothing else holds in place, but for its angle, to two cranks.
func TestSeveralEquations(t *testing.T) {
	var p plan
	l := p.links("left", "mid", "right")
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	p.pin(Frame.At(4, 0), l[2].At(0, 0))
	p.by(&balance{[3]Link{l[0], l[1], l[2]}})
	p.turn(l[0], Frame)
	p.turn(l[2], Frame)
	p.turn(l[1], l[0])
	k := mustNew(t, p.Design)
	if got := k.String(); got != "left, class 1; right, class 1; mid, class 1" {
		t.Error(got)
	}
	s := mustAssemble(t, k, []rigid.Placement{{}, {}, {X: 1, Y: 1}, {X: 4}}, at(0), at(0), at(0))
	for i := range 100 {
		f := float64(i) * 0.1
		if err := s.Move(rigid.Coordinate{Pos: f, Vel: 1}, rigid.Coordinate{Pos: -2 * f, Vel: -2}, rigid.Coordinate{Pos: f, Vel: 1, Acc: 3}); err != nil {
			t.Fatal(err)
		}
		a, m, b := s.Point(l[0].At(1, 0)), s.Point(l[1].At(1, 0)), s.Point(l[2].At(1, 0))
		for _, off := range []r2.Vec{r2.Sub(r2.Add(a.Pos, b.Pos), r2.Scale(2, m.Pos)), r2.Sub(r2.Add(a.Vel, b.Vel), r2.Scale(2, m.Vel)), r2.Sub(r2.Add(a.Acc, b.Acc), r2.Scale(2, m.Acc))} {
			if r2.Norm(off) > 1e-13 {
				t.Fatalf("off by %v at %v", off, f)
			}
		}
	}
	if err := planartest.Check(&balance{[3]Link{1, 2, 3}}, planartest.Settings{}); err != nil {
		t.Error(err)
	}
}

// TestBadConstraints gives New, Assemble and Move Constraints of no use: errors
// that name them.
func TestBadConstraints(t *testing.T) {
	good := spool{1, 2, 0.1, 0.002}
	slider := func(change func(e *Evaluation) error, links ...Link) Constraint {
		if links == nil {
			links = good.Links()
		}
		return odd{links: links, rows: 1, evaluate: func(e *Evaluation) error {
			if err := good.Evaluate(e); err != nil {
				return err
			}
			return change(e)
		}}
	}
	nan := math.NaN()
	mine := errors.New("the belt is torn")
	for name, k := range map[string]struct {
		by   Constraint
		is   error
		says string
		at   string // where it is found
	}{
		"nil":                {nil, ErrReference, "no Constraint", "New"},
		"no links":           {odd{rows: 1}, ErrReference, "0 links", "New"},
		"one link":           {odd{links: []Link{1}, rows: 1}, ErrReference, "ties it to Frame", "New"},
		"twice":              {odd{links: []Link{1, 2, 1}, rows: 1}, ErrReference, "spool twice", "New"},
		"foreign":            {odd{links: []Link{1, 7}, rows: 1}, ErrReference, "link 7 of 3 does not exist", "New"},
		"negative":           {odd{links: []Link{-1, 1}, rows: 1}, ErrReference, "does not exist", "New"},
		"no equations":       {odd{links: []Link{1, 2}}, ErrReference, "0 equations", "New"},
		"too many":           {odd{links: []Link{1, 2}, rows: 1 << 30}, ErrReference, "equations", "New"},
		"depends on nothing": {odd{links: []Link{1, 2, 0}, rows: 1, depends: func(_, i int) Unknowns { return 0 }}, ErrReference, "depends on nothing", "New"},
		"one x":              {odd{links: []Link{1, 2}, rows: 1, depends: func(_, i int) Unknowns { return OfX * Unknowns(i) }}, ErrReference, "ties them to Frame", "New"},
		"two equations":      {odd{links: []Link{1, 2}, rows: 2}, ErrOverconstrained, "", "New"},
		"of no slider":       {odd{links: []Link{0, 1}, rows: 1}, ErrOverconstrained, "", "New"},

		"NaN residual": {slider(func(e *Evaluation) error { e.Rows[0].Residual = nan; return nil }), rigid.ErrNotFinite, "the constraint of joint 2 (links spool, slider, frame)", "Assemble"},
		"NaN slope":    {slider(func(e *Evaluation) error { e.Rows[0].Slopes[1].X = nan; return nil }), rigid.ErrNotFinite, "the constraint of joint 2", "Assemble"},
		"Inf bias":     {slider(func(e *Evaluation) error { e.Rows[0].Bias = math.Inf(1); return nil }), rigid.ErrNotFinite, "the constraint of joint 2", "Assemble"},
		"rows":         {slider(func(e *Evaluation) error { e.Rows = append(e.Rows, e.Rows...); return nil }), rigid.ErrInput, "the constraint of joint 2", "Assemble"},
		"slopes":       {slider(func(e *Evaluation) error { e.Rows[0].Slopes = e.Rows[0].Slopes[:1]; return nil }), rigid.ErrInput, "another number", "Assemble"},
		"none":         {slider(func(e *Evaluation) error { e.Rows = nil; return nil }), rigid.ErrInput, "another number", "Assemble"},
		"own error":    {slider(func(e *Evaluation) error { return mine }), mine, "the constraint of joint 2", "Assemble"},
		"own error 2":  {slider(func(e *Evaluation) error { return mine }), rigid.ErrUnreachable, "torn", "Assemble"},
		"flat":         {slider(func(e *Evaluation) error { e.Rows[0].Slopes[1].X = 0; return nil }), nil, "slider", "Assemble"},
		"frame":        {slider(func(e *Evaluation) error { return nil }, 1, 2), rigid.ErrInput, "in the frame", "Assemble"},

		"NaN later": {slider(func(e *Evaluation) error {
			if e.Links[0].Turn > 0.5 {
				e.Rows[0].Residual = nan
			}
			return nil
		}), rigid.ErrNotFinite, "the constraint of joint 2", "Move"},
		"NaN bias later": {slider(func(e *Evaluation) error {
			if e.Links[0].Turn > 0.5 && e.Links[0].Omega != 0 {
				e.Rows[0].Bias = nan
			}
			return nil
		}), rigid.ErrNotFinite, "the constraint of joint 2", "Move"},
		"rows later": {slider(func(e *Evaluation) error {
			if e.Links[0].Turn > 0.5 {
				e.Rows = e.Rows[:0]
			}
			return nil
		}), rigid.ErrInput, "the constraint of joint 2", "Move"},
		"torn later": {slider(func(e *Evaluation) error {
			if e.Links[0].Turn > 0.5 {
				return mine
			}
			return nil
		}), rigid.ErrUnreachable, "the constraint of joint 2 (links spool, slider, frame) has no value there", "Move"},
	} {
		where, err := "New", error(nil)
		var l *Linkage
		var s *State
		d := wound(good)
		d.Joints[2] = Custom{By: k.by}
		if l, err = New(d); err == nil {
			where = "Assemble"
			if s, err = l.Assemble([]rigid.Placement{{}, {Y: 0.3}, {X: 0.01}}, rigid.Coordinate{Vel: 1}); err == nil {
				where = "Move"
				before := s.Clone()
				in := rigid.Coordinate{Pos: 0.7, Vel: 1}
				err = s.Move(in)
				if n := testing.AllocsPerRun(20, func() { err = s.Move(in) }); n != 0 {
					t.Errorf("%s: %v allocations", name, n)
				}
				if far(l, s, before) != 0 {
					t.Errorf("%s: moved", name)
				}
				if stop, ok := s.Stop(); !ok || stop.Group != 1 || (stop.Done < 0.71 || stop.Done > 0.72) && name != "NaN bias later" {
					t.Errorf("%s: %+v", name, stop)
				}
			}
		}
		if where != k.at || err == nil || k.is != nil && !errors.Is(err, k.is) || !strings.Contains(err.Error(), k.says) || !strings.HasPrefix(err.Error(), "twopoint: ") {
			t.Errorf("%s: %s: %v", name, where, err)
		}
		if bad := (*DesignError)(nil); where == "New" && !errors.As(err, &bad) {
			t.Errorf("%s: no DesignError but %T", name, err)
		}
	}
}

// TestDeclared refuses a Constraint that depends on what it declares not to.
func TestDeclared(t *testing.T) {
	d := wound(odd{links: []Link{1, 2, 0}, rows: 1, evaluate: spool{1, 2, 0.1, 0.002}.Evaluate,
		depends: func(_, i int) Unknowns { return [...]Unknowns{OfAngle, OfY | OfX, 0}[i] }})
	mustAssemble(t, mustNew(t, d), []rigid.Placement{{}, {Y: 0.3}, {X: 0.01}}, at(0))
	d = wound(odd{links: []Link{1, 2, 0}, rows: 1, evaluate: spool{1, 2, 0.1, 0.002}.Evaluate,
		depends: func(_, i int) Unknowns { return [...]Unknowns{0, OfX, 0}[i] }})
	_, err := mustNew(t, d).Assemble([]rigid.Placement{{}, {Y: 0.3}, {X: 0.01}}, at(0))
	if !errors.Is(err, rigid.ErrInput) || !strings.Contains(err.Error(), "depends on more of spool than it declares") {
		t.Error(err)
	}
}

// TestCustomElsewhere: no form in JSON, a line of text, no modes, no sensitivity, a
// copy of the design.
func TestCustomElsewhere(t *testing.T) {
	d := wound(nil)
	if _, err := json.Marshal(d); !errors.Is(err, rigid.ErrInput) || !strings.Contains(err.Error(), "joints[2]") {
		t.Error(err)
	}
	if got := d.Joints[2].(Custom).String(); got != "custom: link 1, link 2, frame by planar_test.spool" {
		t.Error(got)
	}
	if got := (Custom{}).String(); got != "no joint: planar.Custom" {
		t.Error(got)
	}
	l := mustNew(t, d)
	if got := l.Design().Joints[2]; got != d.Joints[2] {
		t.Error(got)
	}
	modes, last := 0, error(nil)
	for s, err := range l.Modes(at(0.3)) {
		if last = err; err == nil {
			modes++
			follows(t, "mode", s.Slide(Link(2).Line(0, 0, 0), Frame.Line(0, 0, 0)), rigid.Coordinate{Pos: -0.03 - 0.09*0.002/(4*math.Pi)}, 1e-15, 0, 0)
		}
	}
	if modes != 1 || !errors.Is(last, ErrIncomplete) {
		t.Errorf("%d modes, %v", modes, last)
	}
	s := mustAssemble(t, l, []rigid.Placement{{}, {Y: 0.3}, {X: 0.1}}, at(0))
	if got := s.Mode(); got != ".?" {
		t.Error(got)
	}
	if err := s.Sensitivity(make([]rigid.Point, 1), Link(2).At(0, 0), Dimension{Of: []Entry{{Joint: 0}}}); !errors.Is(err, rigid.ErrInput) {
		t.Error(err)
	}
	if _, err := l.AssembleMode(".?", at(0)); !errors.Is(err, rigid.ErrInput) {
		t.Error(err)
	}
}

// TestRepeatedCustom sets a Constraint aside that repeats what the joints hold, and
// refuses it where it contradicts them.
func TestRepeatedCustom(t *testing.T) {
	ratio := func(k float64) Constraint {
		return Follower{Of: Turn{2, Frame}, Cam: Turn{1, Frame}, By: rigid.Linear(k, 0)}
	}
	d := func(c Constraint) Design {
		var p plan
		l := p.links("crank", "far crank", "rod")
		p.pin(Frame.At(0, 0), l[0].At(0, 0))
		p.pin(Frame.At(1, 0), l[1].At(0, 0))
		p.pin(l[0].At(0.2, 0), l[2].At(0, 0))
		p.pin(l[1].At(0.2, 0), l[2].At(1, 0))
		p.by(c)
		p.turn(l[0], Frame)
		p.Guess = []rigid.Placement{{}, {Angle: 1}, {X: 1, Angle: 1}, {X: 0.11, Y: 0.17}}
		return p.Design
	}
	l := mustNew(t, d(ratio(1)))
	if got := Checks(l); len(got) != 1 || got[0] != "constraint of joint 4" {
		t.Error(got)
	}
	s := mustAssemble(t, l, nil, at(1))
	for k := range 100 {
		if err := s.Move(at(1 + 0.2*float64(k))); err != nil {
			t.Fatal(err)
		}
	}
	if n := testing.AllocsPerRun(100, func() { _ = s.Move(at(1)) }); n != 0 {
		t.Errorf("%v allocations", n)
	}
	_, err := New(d(ratio(1.3)))
	if !errors.Is(err, ErrInconsistent) && !errors.Is(err, ErrOverconstrained) {
		t.Error(err)
	}
}
