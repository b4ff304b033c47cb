package slidercrank_test

import (
	"bytes"
	"encoding/json"
	"errors"
	"math"
	"strings"
	"testing"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

func TestDimensionErrors(t *testing.T) {
	bad, inf := math.NaN(), math.Inf(-1)
	good := slidercrank.Dimensions{Crank: 0.1, Rod: 0.3, Offset: 0.02}
	with := func(f func(d *slidercrank.Dimensions)) slidercrank.Dimensions {
		d := good
		f(&d)
		return d
	}
	type d = slidercrank.Dimensions
	for _, row := range []struct {
		name  string
		d     d
		field string
		value float64
		want  error
	}{
		{"all zero", d{}, "Crank", 0, rigid.ErrNotPositive},
		{"no crank", with(func(d *d) { d.Crank = 0 }), "Crank", 0, rigid.ErrNotPositive},
		{"negative crank", with(func(d *d) { d.Crank = -0.1 }), "Crank", -0.1, rigid.ErrNotPositive},
		{"crank not a number", with(func(d *d) { d.Crank = bad }), "Crank", bad, rigid.ErrNotFinite},
		{"crank too small", with(func(d *d) { d.Crank = 1e-61 }), "Crank", 1e-61, rigid.ErrInput},
		{"no rod", with(func(d *d) { d.Rod = 0 }), "Rod", 0, rigid.ErrNotPositive},
		{"rod infinite", with(func(d *d) { d.Rod = -inf }), "Rod", -inf, rigid.ErrNotFinite},
		{"rod too great", with(func(d *d) { d.Rod = 1e61 }), "Rod", 1e61, rigid.ErrInput},
		{"offset not a number", with(func(d *d) { d.Offset = bad }), "Offset", bad, rigid.ErrNotFinite},
		{"offset too great", with(func(d *d) { d.Offset = -1e61 }), "Offset", -1e61, rigid.ErrInput},
		{"offset out of reach", with(func(d *d) { d.Offset = 0.41 }), "", 0, rigid.ErrUnreachable},
		{"offset at the reach", with(func(d *d) { d.Offset = -(0.1 + 0.3) }), "", 0, rigid.ErrUnreachable},
		{"crank below the rounding of rod and offset", d{Crank: 1e-25, Rod: 2, Offset: 2 - 0x1p-49}, "", 0, rigid.ErrUnreachable},
		{"offset far out of reach", with(func(d *d) { d.Offset = -4 }), "", 0, rigid.ErrUnreachable},
		{"no such branch", with(func(d *d) { d.Branch = 2 }), "Branch", 2, rigid.ErrInput},
		{"mount x", with(func(d *d) { d.Mount.X = inf }), "Mount.X", inf, rigid.ErrNotFinite},
		{"mount y", with(func(d *d) { d.Mount.Y = bad }), "Mount.Y", bad, rigid.ErrNotFinite},
		{"mount angle", with(func(d *d) { d.Mount.Angle = inf }), "Mount.Angle", inf, rigid.ErrNotFinite},
	} {
		l, err := slidercrank.New(row.d)
		e, ok := errors.AsType[*rigid.DimensionError](err)
		if !ok || l != nil {
			t.Errorf("%s: error %v, linkage %v", row.name, err, l)
			continue
		}
		same := e.Value == row.value || math.IsNaN(e.Value) && math.IsNaN(row.value)
		if e.Name != row.field || !same || !errors.Is(e.Err, row.want) {
			t.Errorf("%s: %+v", row.name, e)
		}
		if !strings.HasPrefix(err.Error(), "twopoint: ") {
			t.Errorf("%s: message %q", row.name, err)
		}
	}
	_, err := slidercrank.New(slidercrank.Dimensions{Crank: -1, Rod: bad, Offset: inf, Branch: 7, Mount: rigid.Placement{Y: bad}})
	for _, name := range []string{"Crank", "Rod", "Offset", "Branch", "Mount.Y"} {
		if !strings.Contains(err.Error(), "dimension "+name+" ") {
			t.Errorf("%s is not named in %q", name, err)
		}
	}
}

func TestDimensionsAreGivenBack(t *testing.T) {
	d := slidercrank.Dimensions{Crank: 1e-60, Rod: 1e60, Offset: -5, Branch: slidercrank.Behind, Mount: rigid.Placement{X: 1, Y: 2, Angle: 300}}
	if got := newPress(t, d).Dimensions(); got != d {
		t.Errorf("%+v, want %+v", got, d)
	}
}

func TestDimensionsInJSON(t *testing.T) {
	d := slidercrank.Dimensions{Crank: 0.1, Rod: 0.3, Offset: -0.02, Branch: slidercrank.Behind, Mount: rigid.Placement{X: 1, Y: 2, Angle: 3}}
	const want = `{"crank":0.1,"rod":0.3,"offset":-0.02,"branch":"behind","mount":{"x":1,"y":2,"angle":3}}`
	text, err := json.Marshal(d)
	if err != nil || string(text) != want {
		t.Fatalf("%s, %v", text, err)
	}
	read := func(text string) (d slidercrank.Dimensions, err error) {
		r := json.NewDecoder(bytes.NewReader([]byte(text)))
		r.DisallowUnknownFields()
		err = r.Decode(&d)
		return d, err
	}
	if got, err := read(want); err != nil || got != d {
		t.Errorf("%+v, %v", got, err)
	}
	for _, text := range []string{`{"krank":1}`, `{"branch":"sideways"}`, `{"branch":1}`} {
		if got, err := read(text); err == nil {
			t.Errorf("%s was read as %+v", text, got)
		}
	}
	d.Branch = 2
	if text, err := json.Marshal(d); !errors.Is(err, rigid.ErrInput) {
		t.Errorf("an unknown branch was written: %s, %v", text, err)
	}
}

func TestBranchText(t *testing.T) {
	for b, want := range map[slidercrank.Branch]string{slidercrank.Ahead: "ahead", slidercrank.Behind: "behind", 7: "Branch(7)"} {
		if b.String() != want {
			t.Errorf("%d: %q", b, b)
		}
		text, err := b.MarshalText()
		if b > 1 {
			if !errors.Is(err, rigid.ErrInput) || text != nil {
				t.Errorf("%v: %s, %v", b, text, err)
			}
			continue
		}
		got := slidercrank.Branch(9)
		if err := got.UnmarshalText(text); err != nil || got != b {
			t.Errorf("%v came back as %v, %v", b, got, err)
		}
	}
	b := slidercrank.Behind
	if err := b.UnmarshalText([]byte("Ahead")); !errors.Is(err, rigid.ErrInput) || b != slidercrank.Behind {
		t.Errorf("read an unknown name: %v, %v", b, err)
	}
}
