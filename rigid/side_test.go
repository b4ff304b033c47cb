package rigid_test

import (
	"encoding/json"
	"errors"
	"testing"

	"example.com/twopoint/rigid"
)

func TestSide(t *testing.T) {
	var zero rigid.Side
	if zero != rigid.Left {
		t.Error("the zero side is not left")
	}
	for _, c := range []struct {
		side rigid.Side
		text string
		ok   bool
	}{
		{rigid.Left, "left", true}, {rigid.Right, "right", true}, {2, "Side(2)", false}, {-128, "Side(-128)", false},
	} {
		if got := c.side.String(); got != c.text {
			t.Errorf("%q, want %q", got, c.text)
		}
		text, err := c.side.MarshalText()
		if c.ok && (err != nil || string(text) != c.text) || !c.ok && (!errors.Is(err, rigid.ErrInput) || text != nil) {
			t.Errorf("MarshalText of %v: %q, %v", c.side, text, err)
		}
	}
}

func TestSideInJSON(t *testing.T) {
	type pose struct{ Knee rigid.Side }
	text, err := json.Marshal(pose{rigid.Right})
	if err != nil || string(text) != `{"Knee":"right"}` {
		t.Errorf("%s, %v", text, err)
	}
	var p pose
	if err := json.Unmarshal(text, &p); err != nil || p.Knee != rigid.Right {
		t.Errorf("%v, %v", p, err)
	}
	if err := json.Unmarshal([]byte(`{"Knee":"up"}`), &p); err == nil || p.Knee != rigid.Right {
		t.Errorf("up: %v, %v", p, err)
	}
}

func FuzzSideText(f *testing.F) {
	f.Add("left")
	f.Add("Right")
	f.Add("")
	f.Fuzz(func(t *testing.T, text string) {
		side := rigid.Side(7)
		err := side.UnmarshalText([]byte(text))
		if known := text == "left" || text == "right"; known != (err == nil) {
			t.Fatalf("%q: %v", text, err)
		}
		if err != nil {
			if !errors.Is(err, rigid.ErrInput) || side != 7 {
				t.Errorf("%q: %v, side %v", text, err, side)
			}
			return
		}
		if back, err := side.MarshalText(); err != nil || string(back) != text {
			t.Errorf("%q comes back as %q, %v", text, back, err)
		}
	})
}
