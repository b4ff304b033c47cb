package planar_test

import (
	"fmt"
	"strings"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

func TestStrings(t *testing.T) {
	p := sliderCrank()
	p.turn(1, Frame)
	l, err := New(p.Design)
	if err != nil {
		t.Fatal(err)
	}
	s, err := l.AssembleMode(".+", rigid.Coordinate{})
	if err != nil {
		t.Fatal(err)
	}
	for want, v := range map[string]any{
		"frame":                          Frame,
		"link 3":                         Link(3),
		"link 3 (0.05, 0)":               Link(3).At(0.05, 0),
		"frame (0.05, 0) at 1.5 rad":     Frame.Line(0.05, 0, 1.5),
		"no dyad":                        NoDyad,
		"RPP":                            RPP,
		"Kind(9)":                        Kind(9),
		"link 2 + link 3, RRP":           l.Groups()[1],
		"crank, class 1; rod + ram, RRP": l,
		"":                               &Linkage{},
		"no state":                       &State{},
		`mode ".+", drives 0, margin 1; crank (0, 0) at 0; rod (0.05, 0) at 0; ram (0.25, 0) at 0`: s,
	} {
		if got := fmt.Sprint(v); got != want {
			t.Errorf("%q, want %q", got, want)
		}
	}
	const want = `links: frame, crank, rod, ram, gear "B", Träger <1>
joint 0: revolute: frame (0, 0), crank (0.1, -0.25)
joint 1: prismatic: rod (1, 2) at 0.1 rad, ram (1e-300, -0) at 3.141592653589793 rad
joint 2: sliding pin: rod (0.3333333333333333, 0) in ram (0, 0) at -1 rad
joint 3: fixed: gear "B" (0, 0) at 0 rad, Träger <1> (1, 0) at 0 rad
joint 4: gear pair: crank, gear "B" on Träger <1>, 32:20 teeth, radii 0.032:0.02, internal, phase 0.7
joint 5: gear pair: crank, gear "B" on frame, 32:20 teeth, as assembled
joint 6: gear pair: crank, gear "B" on frame, radii 1:-0
joint 7: rack pair: crank (1, 2) on ram (3, 4) at 5 rad, radius 0.02, right, phase -3
joint 8: rack pair: crank (1, 2) on ram (3, 4) at 5 rad, radius 0, as assembled
drive 0: turn: crank from frame
drive 1: slide: rod (1, 2) at 3 rad from ram (4, 5) at 6 rad
drive 2: reach: rod (1, 2) to ram (1.7976931348623157e+308, 5e-324)`
	d := everything()
	if got := d.String(); got != want {
		t.Errorf("%s\nwant\n%s", got, want)
	}
	// joints and drives alone, without names
	named := strings.NewReplacer("crank", "link 1", "rod", "link 2", "ram", "link 3", `gear "B"`, "link 4", "Träger <1>", "link 5", "frame", "frame")
	lines := strings.Split(want, "\n")
	for i, j := range d.Joints {
		_, text, _ := strings.Cut(lines[1+i], ": ")
		kind, rest, _ := strings.Cut(text, ": ")
		if got, want := fmt.Sprint(j), kind+": "+named.Replace(rest); got != want {
			t.Errorf("%s, want %s", got, want)
		}
	}
	for i, m := range d.Drives {
		_, text, _ := strings.Cut(lines[1+len(d.Joints)+i], ": ")
		kind, rest, _ := strings.Cut(text, ": ")
		if got, want := fmt.Sprint(m), kind+": "+named.Replace(rest); got != want {
			t.Errorf("%s, want %s", got, want)
		}
	}
	for k := range RPP + 2 {
		text, err := k.MarshalText()
		var back Kind
		if known := k <= RPP; (err == nil) != known || known && (back.UnmarshalText(text) != nil || back != k) || !known && back.UnmarshalText([]byte("RRX")) == nil {
			t.Errorf("%v: %s, %v", k, text, err)
		}
	}
	if got := fmt.Sprint(Design{Joints: []Joint{nil}, Drives: []Drive{&Turn{}}}); got != "links: \njoint 0: no joint: <nil>\ndrive 0: no drive: *planar.Turn" {
		t.Errorf("%q", got)
	}
}
