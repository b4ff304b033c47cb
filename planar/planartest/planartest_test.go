package planartest_test

import (
	"errors"
	"fmt"
	"math"
	"strings"
	"testing"

	"example.com/twopoint/planar"
	"example.com/twopoint/planar/planartest"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// A tie is a bar between two points, as a Constraint; what is wrong with it, if
// anything, is done to it by spoil.
type tie struct {
	a, b    planar.Attachment
	length  float64
	links   []planar.Link
	rows    int
	spoil   func(e *planar.Evaluation)
	depends func(i int) planar.Unknowns
}

func (t *tie) Links() []planar.Link {
	if t.links != nil {
		return t.links
	}
	return []planar.Link{t.a.Link, t.b.Link}
}

func (t *tie) Rows() int { return t.rows }

func (t *tie) Depends(_, i int) planar.Unknowns {
	if t.depends == nil {
		return planar.OfAll
	}
	return t.depends(i)
}

// Evaluate writes  Φ = |d|² − l²,  Φ″ = 2(|d′|² + d·d″).
func (t *tie) Evaluate(e *planar.Evaluation) error {
	p, q := e.Links[0].At(r2.Vec{X: t.a.X, Y: t.a.Y}), e.Links[1].At(r2.Vec{X: t.b.X, Y: t.b.Y})
	d, v := r2.Sub(q.Pos, p.Pos), r2.Sub(q.Vel, p.Vel)
	eq := &e.Rows[0]
	eq.Residual = r2.Norm2(d) - t.length*t.length
	for i, k := range [2]rigid.Point{p, q} {
		sign := float64(4*i - 2)
		r := r2.Sub(k.Pos, e.Links[i].Pose.Origin)
		eq.Slopes[i] = planar.Slope{X: sign * d.X, Y: sign * d.Y, Angle: sign * (r.X*d.Y - r.Y*d.X)}
	}
	eq.Bias = 2 * (r2.Norm2(v) + r2.Dot(d, r2.Sub(q.Acc, p.Acc)))
	if t.spoil != nil {
		t.spoil(e)
	}
	return nil
}

func bar() *tie {
	return &tie{a: planar.Link(1).At(0.1, 0.2), b: planar.Link(2).At(-0.3, 0.1), length: 0.7, rows: 1}
}

// TestCheck passes what is right and tells each fault from the others.
func TestCheck(t *testing.T) {
	for seed := range uint64(5) {
		if err := planartest.Check(bar(), planartest.Settings{Seed: seed}); err != nil {
			t.Error(err)
		}
	}
	count := 0
	for name, k := range map[string]struct {
		spoil func(t *tie)
		says  string
	}{
		"x":        {func(t *tie) { t.spoil = func(e *planar.Evaluation) { e.Rows[0].Slopes[0].X *= 1.0001 } }, "slope by x of link 1"},
		"y":        {func(t *tie) { t.spoil = func(e *planar.Evaluation) { e.Rows[0].Slopes[1].Y = 0 } }, "slope by y of link 2"},
		"angle":    {func(t *tie) { t.spoil = func(e *planar.Evaluation) { e.Rows[0].Slopes[1].Angle *= -1 } }, "slope by angle of link 2"},
		"residual": {func(t *tie) { t.spoil = func(e *planar.Evaluation) { e.Rows[0].Residual *= 2 } }, "slope by x of link 1"},
		"bias":     {func(t *tie) { t.spoil = func(e *planar.Evaluation) { e.Rows[0].Bias *= 0.999 } }, "bias is"},
		"no bias":  {func(t *tie) { t.spoil = func(e *planar.Evaluation) { e.Rows[0].Bias = 0 } }, "bias is"},
		"declared": {func(t *tie) {
			t.depends = func(i int) planar.Unknowns { return planar.OfAll - planar.OfAngle*planar.Unknowns(i) }
		}, "declared not to depend on angle of link 2"},
		"NaN":      {func(t *tie) { t.spoil = func(e *planar.Evaluation) { e.Rows[0].Slopes[1].Y = math.NaN() } }, "not finite"},
		"NaN bias": {func(t *tie) { t.spoil = func(e *planar.Evaluation) { e.Rows[0].Bias = math.NaN() } }, "not finite"},
		"rows":     {func(t *tie) { t.spoil = func(e *planar.Evaluation) { e.Rows = append(e.Rows, planar.Equation{}) } }, "2 equations, not 1"},
		"slopes":   {func(t *tie) { t.spoil = func(e *planar.Evaluation) { e.Rows[0].Slopes = nil } }, "0 slopes for 2 links"},
		"no rows":  {func(t *tie) { t.rows = 0 }, "0 equations"},
		"one link": {func(t *tie) { t.links = []planar.Link{1} }, "1 links"},
		"twice":    {func(t *tie) { t.links = []planar.Link{2, 2} }, "link 2 twice"},
		"in frame": {func(t *tie) {
			t.spoil = func(e *planar.Evaluation) {
				x := e.Links[0].Pose.Origin
				e.Rows[0].Residual += x.X
				e.Rows[0].Slopes[0].X++
			}
		}, "where its links are in the frame"},
		"in frame, θ": {func(t *tie) {
			t.spoil = func(e *planar.Evaluation) { e.Rows[0].Residual += e.Links[0].Turn; e.Rows[0].Slopes[0].Angle++ }
		}, "where its links are in the frame"},
		"changes": {func(t *tie) { t.spoil = func(e *planar.Evaluation) { count++; e.Rows[0].Residual += float64(count) } }, "when asked again"},
	} {
		c := bar()
		k.spoil(c)
		if err := planartest.Check(c, planartest.Settings{}); err == nil || !strings.Contains(err.Error(), k.says) {
			t.Errorf("%s: %v, want %s", name, err, k.says)
		}
	}
	if err := planartest.Check(bar(), planartest.Settings{Near: make([]rigid.Placement, 3)}); err == nil {
		t.Error("three placements for two links")
	}
	out := errors.New("out of range")
	if err := planartest.Check(refuses{bar(), out}, planartest.Settings{}); !errors.Is(err, out) {
		t.Error(err)
	}
}

type refuses struct {
	*tie
	err error
}

func (r refuses) Evaluate(*planar.Evaluation) error { return r.err }

// The bar is tried near where the machine has it, at a tenth of the usual spread.
func ExampleSettings() {
	near := planartest.Settings{Near: []rigid.Placement{{}, {X: 0.9, Angle: 1}}, Spread: 0.005, Length: 0.5}
	fmt.Println(planartest.Check(bar(), near))
	// Output: <nil>
}

// The plate of a tile gripper holds a bar to the arm, written as a Constraint. Its
// author forgot that the pins turn with their links.
func ExampleCheck() {
	c := bar()
	fmt.Println(planartest.Check(c, planartest.Settings{Length: 0.5}))
	c.spoil = func(e *planar.Evaluation) { e.Rows[0].Slopes[0].Angle = 0 }
	err := planartest.Check(c, planartest.Settings{Length: 0.5})
	fmt.Println(strings.Contains(err.Error(), "slope by angle of link 1 is 0, by differences"))
	// Output:
	// <nil>
	// true
}
