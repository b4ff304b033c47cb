package planar_test

import (
	"encoding/json"
	"errors"
	"fmt"
	"math"
	"strings"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
	"github.com/google/go-cmp/cmp"
)

// everything has every kind of joint and drive.
func everything() Design {
	var p plan
	l := p.links("crank", "rod", "ram", "gear \"B\"", "Träger <1>")
	p.pin(Frame.At(0, 0), l[0].At(0.1, -0.25))
	p.guide(l[1].Line(1, 2, 0.1), l[2].Line(1e-300, math.Copysign(0, -1), math.Pi))
	p.slot(l[1].At(1./3, 0), l[2].Line(0, 0, -1))
	p.Joints = append(p.Joints,
		Fixed{A: l[3].Line(0, 0, 0), B: l[4].Line(1, 0, 0)},
		GearPair{A: l[0], B: l[3], Arm: l[4], TeethA: 32, TeethB: 20, RadiusA: 0.032, RadiusB: 0.02, Internal: true, Phase: 0.7},
		GearPair{A: l[0], B: l[3], TeethA: 32, TeethB: 20, AsAssembled: true},
		GearPair{A: l[0], B: l[3], RadiusA: 1, RadiusB: math.Copysign(0, -1)},
		RackPair{Pinion: l[0].At(1, 2), Rack: l[2].Line(3, 4, 5), Radius: 0.02, Right: true, Phase: -3},
		RackPair{Pinion: l[0].At(1, 2), Rack: l[2].Line(3, 4, 5), AsAssembled: true},
	)
	p.turn(l[0], Frame)
	p.slide(l[1].Line(1, 2, 3), l[2].Line(4, 5, 6))
	p.reach(l[1].At(1, 2), l[2].At(math.MaxFloat64, 5e-324))
	p.Guess = []rigid.Placement{{X: 1}, {}, {X: 2, Y: 3, Angle: 4}, {}, {}, {Y: math.Copysign(0, -1)}}
	return p.Design
}

func TestJSONRoundTrip(t *testing.T) {
	noGuess := everything()
	noGuess.Guess = nil
	for _, d := range []Design{everything(), noGuess, {Links: []string{"frame"}}, peaucellier("QB"), scissor(3), rackPress()} {
		text, err := json.Marshal(d)
		if err != nil {
			t.Fatal(err)
		}
		var back Design
		if err := json.Unmarshal(text, &back); err != nil {
			t.Fatalf("%v\n%s", err, text)
		}
		if diff := cmp.Diff(d, back); diff != "" {
			t.Errorf("%s\n%s", diff, text)
		}
		again, _ := json.Marshal(back) // tells −0 from 0
		if string(again) != string(text) {
			t.Errorf("again\n%s\nwas\n%s", again, text)
		}
	}
}

// The form is part of the interface: machines stand in files.
func TestJSONForm(t *testing.T) {
	const text = `{"links":["frame","crank","rod","ram"],"joints":[` +
		`{"revolute":{"a":{"link":"frame","x":0,"y":0},"b":{"link":"crank","x":0,"y":0}}},` +
		`{"slidingPin":{"pin":{"link":"crank","x":0.05,"y":0},"slot":{"link":"rod","x":0,"y":0,"angle":0}}},` +
		`{"gearPair":{"a":"crank","b":"rod","arm":"frame","teethA":32,"teethB":20,"internal":true}}],` +
		`"drives":[{"turn":{"of":"crank","from":"frame"}}],"guess":{"crank":{"x":0,"y":0,"angle":1},"rod":{"x":0,"y":0,"angle":0},"ram":{"x":0,"y":0,"angle":0}}}`
	want := Design{
		Links: []string{"frame", "crank", "rod", "ram"},
		Joints: []Joint{
			Revolute{A: Frame.At(0, 0), B: Link(1).At(0, 0)},
			SlidingPin{Pin: Link(1).At(0.05, 0), Slot: Link(2).Line(0, 0, 0)},
			GearPair{A: 1, B: 2, Arm: Frame, TeethA: 32, TeethB: 20, Internal: true},
		},
		Drives: []Drive{Turn{Of: 1, From: Frame}},
		Guess:  []rigid.Placement{{}, {Angle: 1}, {}, {}},
	}
	got, err := json.Marshal(want)
	if err != nil || string(got) != text {
		t.Errorf("%v\n%s\nwant\n%s", err, got, text)
	}
	var read Design
	if err := json.Unmarshal([]byte(text), &read); err != nil || !cmp.Equal(read, want) {
		t.Errorf("%v\n%s", err, cmp.Diff(want, read))
	}
}

func TestJSONRefusals(t *testing.T) {
	in := func(joint string) string { return `{"links":["frame","crank"],"joints":[` + joint + `]}` }
	const a, b = `{"link":"frame"}`, `{"link":"crank"}`
	for _, c := range []struct {
		text, says string
		err        error
	}{
		{`null`, "a design is not an object", rigid.ErrInput},
		{`[]`, "a design is not an object", rigid.ErrInput},
		{`{}`, "links is missing", rigid.ErrInput},
		{`{"links":["frame"],"Joints":[]}`, "Joints: unknown key", rigid.ErrInput},
		{`{"links":["frame"],"links":["frame"]}`, "links: a key twice", rigid.ErrInput},
		{`{"links":{}}`, "links is not an array", rigid.ErrInput},
		{`{"links":["frame",3]}`, "links[1]: 3 is no string", rigid.ErrInput},
		{`{"links":["frame",null]}`, "links[1]: null is no string", rigid.ErrInput},
		{`{"links":["frame","rod","rod"]}`, `links[2]: two links of the name "rod"`, ErrReference},
		{`{"links":["frame"],"joints":null}`, "joints is not an array", rigid.ErrInput},
		{in(`7`), "joints[0] is not an object", rigid.ErrInput},
		{in(`{}`), "joints[0] has 0 keys", rigid.ErrInput},
		{in(`{"revolute":{"a":` + a + `,"b":` + b + `},"turn":{}}`), "joints[0] has 2 keys", rigid.ErrInput},
		{in(`{"Revolute":{"a":` + a + `,"b":` + b + `}}`), "joints[0].Revolute: no kind of joint", rigid.ErrInput},
		{in(`{"turn":{}}`), "joints[0].turn: no kind of joint", rigid.ErrInput},
		{in(`{"custom":{}}`), "joints[0].custom: no kind of joint", rigid.ErrInput},
		{in(`{"revolute":{"a":` + a + `}}`), "joints[0].revolute.b is missing", rigid.ErrInput},
		{in(`{"revolute":{"a":` + a + `,"b":` + b + `,"c":1}}`), "joints[0].revolute.c: unknown key", rigid.ErrInput},
		{in(`{"revolute":{"a":` + a + `,"b":{"link":"crank","X":1}}}`), "joints[0].revolute.b.X: unknown key", rigid.ErrInput},
		{in(`{"revolute":{"a":` + a + `,"b":{"x":1}}}`), "joints[0].revolute.b.link is missing", rigid.ErrInput},
		{in(`{"revolute":{"a":` + a + `,"b":{"link":"krank"}}}`), `joints[0].revolute.b.link: no link has the name "krank"`, ErrReference},
		{in(`{"revolute":{"a":` + a + `,"b":{"link":1}}}`), "joints[0].revolute.b.link: 1 is no string", rigid.ErrInput},
		{in(`{"revolute":{"a":` + a + `,"b":{"link":"crank","x":"1"}}}`), `joints[0].revolute.b.x: "1" is no float64`, rigid.ErrInput},
		{in(`{"revolute":{"a":` + a + `,"b":{"link":"crank","x":null}}}`), "joints[0].revolute.b.x: null is no float64", rigid.ErrInput},
		{in(`{"revolute":{"a":` + a + `,"b":{"link":"crank","x":1e999}}}`), "joints[0].revolute.b.x: 1e999 is no float64", rigid.ErrInput},
		{in(`{"revolute":{"a":` + a + `,"b":{"link":"crank","angle":1}}}`), "joints[0].revolute.b.angle: unknown key", rigid.ErrInput},
		{in(`{"gearPair":{"a":"crank","b":"frame","arm":"frame","teethA":2.5}}`), "joints[0].gearPair.teethA: 2.5 is no int", rigid.ErrInput},
		{in(`{"gearPair":{"a":"crank","b":"frame","arm":"frame","internal":1}}`), "joints[0].gearPair.internal: 1 is no bool", rigid.ErrInput},
		{in(`{"gearPair":{"a":"crank","b":"frame"}}`), "joints[0].gearPair.arm is missing", rigid.ErrInput},
		{in(`{"rackPair":{"pinion":` + a + `,"rack":` + b + `}}`), "joints[0].rackPair.radius is missing", rigid.ErrInput},
		{`{"links":["frame"],"drives":[{"revolute":{}}]}`, "drives[0].revolute: no kind of drive", rigid.ErrInput},
		{`{"links":["frame"],"drives":[{"turn":{"of":"frame","from":"x"}}]}`, `drives[0].turn.from: no link has the name "x"`, ErrReference},
		{`{"links":["frame"],"guess":{"x":{}}}`, "guess.x: unknown key", rigid.ErrInput},
		{`{"links":["frame"],"guess":{"frame":{"z":1}}}`, "guess.frame.z: unknown key", rigid.ErrInput},
		{`{"links":["frame","crank"],"guess":{}}`, "guess.crank is missing", rigid.ErrInput},
		{`{"links":["frame","crank","rod"],"guess":{"frame":{},"crank":{"x":1}}}`, "guess.rod is missing", rigid.ErrInput},
		{`{"links":[],"guess":{"crank":{}}}`, "guess.crank: unknown key", rigid.ErrInput},
		{`{"links":["frame"]} {}`, "", nil}, // by encoding/json itself
		{`{"links":["frame"]`, "", nil},
	} {
		d := Design{Links: []string{"as", "before"}}
		err := json.Unmarshal([]byte(c.text), &d)
		if err == nil || c.err != nil && !errors.Is(err, c.err) || !strings.Contains(err.Error(), c.says) {
			t.Errorf("%s: %v, want %q", c.text, err, c.says)
		}
		if c.err != nil && !strings.HasPrefix(err.Error(), "twopoint: ") {
			t.Errorf("%s: %v", c.text, err)
		}
		if len(d.Links) != 2 || d.Joints != nil {
			t.Errorf("%s: changed the design to %+v", c.text, d)
		}
	}
	var d Design
	for text, links := range map[string]int{
		`{"links":["frame","crank"]}`:                      0,
		`{"links":["frame","crank"],"guess":{"crank":{}}}`: 2,
		`{"links":["frame"],"guess":{}}`:                   1,
		`{"links":[],"guess":{}}`:                          0,
	} {
		if err := json.Unmarshal([]byte(text), &d); err != nil || len(d.Guess) != links {
			t.Errorf("%s: a guess of %d links, %v", text, len(d.Guess), err)
		}
	}
	for _, text := range []string{"", "{", `{"links":["frame"]} {}`, `{"links":["frame"]} }`, `{"links":[tru]}`, "\xff"} {
		if err := d.UnmarshalJSON([]byte(text)); !errors.Is(err, rigid.ErrInput) {
			t.Errorf("%q by the method: %v", text, err)
		}
	}
}

func TestJSONUnmarshallable(t *testing.T) {
	two := []string{"frame", "crank"}
	for says, d := range map[string]Design{
		`links[2]: two links of the name ""`:        {Links: []string{"frame", "", ""}},
		"joints[0]: link 2 of 2 does not exist":     {Links: two, Joints: []Joint{Revolute{A: Link(2).At(0, 0)}}},
		"joints[0]: link -3 of 2 does not exist":    {Links: two, Joints: []Joint{Revolute{B: Link(-3).At(0, 0)}}},
		"drives[0]: link":                           {Drives: []Drive{Turn{}}},
		"joints[1] has no form":                     {Links: two, Joints: []Joint{Revolute{}, nil}},
		"joints[0] has no form":                     {Links: two, Joints: []Joint{&Revolute{}}},
		"drives[0] has no form":                     {Links: two, Drives: []Drive{&Turn{}}},
		"joints[0]: json: unsupported value: NaN":   {Links: two, Joints: []Joint{RackPair{Radius: math.NaN()}}},
		"drives[0]: json: unsupported value: +Inf":  {Links: two, Drives: []Drive{Slide{Of: Link(1).Line(0, 0, math.Inf(1))}}},
		"guess: 1 placements for 2 links":           {Links: two, Guess: []rigid.Placement{{}}},
		"guess.crank: json: unsupported value: NaN": {Links: two, Guess: []rigid.Placement{{}, {X: math.NaN()}}},
	} {
		text, err := json.Marshal(d)
		if err == nil || !strings.Contains(err.Error(), says) || text != nil {
			t.Errorf("%s: %v, want %q", text, err, says)
		}
	}
}

// FuzzJSON: whatever unmarshals marshals, to what unmarshals to the same.
func FuzzJSON(f *testing.F) {
	for _, d := range []Design{everything(), scissor(1), rackPress(), digger(false)} {
		text, err := json.Marshal(d)
		if err != nil {
			f.Fatal(err)
		}
		f.Add(text)
	}
	f.Add([]byte(`{"links":["\ud800","\ufffd"],"guess":{}}`))
	f.Fuzz(func(t *testing.T, text []byte) {
		var d, back Design
		if err := d.UnmarshalJSON(text); err != nil {
			return
		}
		again, err := json.Marshal(d)
		if err != nil {
			t.Fatalf("%s: %v", text, err)
		}
		if err := json.Unmarshal(again, &back); err != nil {
			t.Fatalf("%s: %v", again, err)
		}
		if diff := cmp.Diff(d, back); diff != "" {
			t.Fatal(diff)
		}
		if l, err := New(back); err == nil {
			_ = fmt.Sprint(l.Groups())
		}
	})
}
