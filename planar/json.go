package planar

import (
	"bytes"
	"encoding/json"
	"fmt"

	"example.com/twopoint/rigid"
)

// The forms in which joints and drives stand in JSON.
type (
	jsonPoint struct {
		Link string  `json:"link"`
		X    float64 `json:"x"`
		Y    float64 `json:"y"`
	}
	jsonLine struct {
		Link  string  `json:"link"`
		X     float64 `json:"x"`
		Y     float64 `json:"y"`
		Angle float64 `json:"angle"`
	}
	jsonGears struct {
		A           string  `json:"a"`
		B           string  `json:"b"`
		Arm         string  `json:"arm"`
		TeethA      int     `json:"teethA,omitzero"`
		TeethB      int     `json:"teethB,omitzero"`
		RadiusA     float64 `json:"radiusA,omitzero"`
		RadiusB     float64 `json:"radiusB,omitzero"`
		Internal    bool    `json:"internal,omitzero"`
		Phase       float64 `json:"phase,omitzero"`
		AsAssembled bool    `json:"asAssembled,omitzero"`
	}
	jsonRack struct {
		Pinion      jsonPoint `json:"pinion"`
		Rack        jsonLine  `json:"rack"`
		Radius      float64   `json:"radius"`
		Right       bool      `json:"right,omitzero"`
		Phase       float64   `json:"phase,omitzero"`
		AsAssembled bool      `json:"asAssembled,omitzero"`
	}
	jsonPair[T any] struct {
		A T `json:"a"`
		B T `json:"b"`
	}
	jsonSlot struct {
		Pin  jsonPoint `json:"pin"`
		Slot jsonLine  `json:"slot"`
	}
	jsonDriven[T any] struct {
		Of   T `json:"of"`
		From T `json:"from"`
	}
)

// MarshalJSON writes the design as one object, with links by their names, joints and
// drives as objects of one key, their kind, in m and rad:
//
//	{
//	  "links": ["frame", "crank", "rod", "ram"],
//	  "joints": [
//	    {"revolute": {"a": {"link": "frame", "x": 0, "y": 0}, "b": {"link": "crank", "x": 0, "y": 0}}},
//	    {"prismatic": {"a": {"link": "frame", "x": 0, "y": 0, "angle": 0}, "b": …}},
//	    {"slidingPin": {"pin": {"link": …}, "slot": {"link": …, "angle": 0}}},
//	    {"fixed": {"a": …, "b": …}},
//	    {"gearPair": {"a": "sun", "b": "planet", "arm": "carrier", "teethA": 32, "teethB": 20}},
//	    {"rackPair": {"pinion": {"link": …}, "rack": {"link": …}, "radius": 0.02}}
//	  ],
//	  "drives": [
//	    {"turn": {"of": "crank", "from": "frame"}},
//	    {"slide": {"of": {"link": …}, "from": {"link": …}}},
//	    {"reach": {"a": {"link": …}, "b": {"link": …}}}
//	  ],
//	  "guess": {"crank": {"x": 0, "y": 0, "angle": 1}, …}
//	}
//
// The first of the links is the frame, whatever its name. MarshalJSON returns an
// error that wraps rigid.ErrInput, ErrReference or one of encoding/json, and tells the
// place, for what has no such form: two links of one name, a link that does not exist,
// a number that is not finite, a joint or drive of another type, a guess for another
// number of links.
func (d Design) MarshalJSON() ([]byte, error) {
	w := jsonWriter{d: &d}
	names := map[string]bool{}
	for i, name := range d.Links {
		if names[name] {
			return nil, fmt.Errorf("%w: links[%d]: two links of the name %q", ErrReference, i, name)
		}
		names[name] = true
	}
	form := struct {
		Links  []string          `json:"links"`
		Joints []json.RawMessage `json:"joints"`
		Drives []json.RawMessage `json:"drives"`
		Guess  json.RawMessage   `json:"guess,omitempty"`
	}{Links: append([]string{}, d.Links...), Joints: []json.RawMessage{}, Drives: []json.RawMessage{}}
	for i, j := range d.Joints {
		form.Joints = append(form.Joints, w.one(fmt.Sprintf("joints[%d]", i), w.joint(j)))
	}
	for i, m := range d.Drives {
		form.Drives = append(form.Drives, w.one(fmt.Sprintf("drives[%d]", i), w.drive(m)))
	}
	if d.Guess != nil {
		form.Guess = w.guess()
	}
	if w.err != nil {
		return nil, w.err
	}
	return json.Marshal(form)
}

// A jsonWriter keeps its first error.
type jsonWriter struct {
	d   *Design
	bad Link // of the value being written, that does not exist, or 0
	err error
}

// one writes what joint or drive returns.
func (w *jsonWriter) one(at string, value map[string]any) json.RawMessage {
	text, err := json.Marshal(value)
	switch {
	case w.err != nil:
		return nil
	case value == nil:
		w.err = fmt.Errorf("%w: %s has no form in JSON", rigid.ErrInput, at)
	case w.bad != 0:
		w.err = fmt.Errorf("%w: %s: link %d of %d does not exist", ErrReference, at, w.bad, len(w.d.Links))
	case err != nil:
		w.err = fmt.Errorf("twopoint: %s: %w", at, err)
	}
	return text
}

func (w *jsonWriter) joint(j Joint) map[string]any {
	switch j := j.(type) {
	case Revolute:
		return map[string]any{"revolute": jsonPair[jsonPoint]{w.point(j.A), w.point(j.B)}}
	case Prismatic:
		return map[string]any{"prismatic": jsonPair[jsonLine]{w.line(j.A), w.line(j.B)}}
	case SlidingPin:
		return map[string]any{"slidingPin": jsonSlot{w.point(j.Pin), w.line(j.Slot)}}
	case Fixed:
		return map[string]any{"fixed": jsonPair[jsonLine]{w.line(j.A), w.line(j.B)}}
	case GearPair:
		return map[string]any{"gearPair": jsonGears{w.name(j.A), w.name(j.B), w.name(j.Arm),
			j.TeethA, j.TeethB, j.RadiusA, j.RadiusB, j.Internal, j.Phase, j.AsAssembled}}
	case RackPair:
		return map[string]any{"rackPair": jsonRack{w.point(j.Pinion), w.line(j.Rack), j.Radius, j.Right, j.Phase, j.AsAssembled}}
	}
	return nil
}

func (w *jsonWriter) drive(m Drive) map[string]any {
	switch m := m.(type) {
	case Turn:
		return map[string]any{"turn": jsonDriven[string]{w.name(m.Of), w.name(m.From)}}
	case Slide:
		return map[string]any{"slide": jsonDriven[jsonLine]{w.line(m.Of), w.line(m.From)}}
	case Reach:
		return map[string]any{"reach": jsonPair[jsonPoint]{w.point(m.A), w.point(m.B)}}
	}
	return nil
}

// guess writes the guess by the names of the links; the frame's only where it is
// not zero.
func (w *jsonWriter) guess() json.RawMessage {
	if len(w.d.Guess) != len(w.d.Links) && w.err == nil {
		w.err = fmt.Errorf("%w: guess: %d placements for %d links", rigid.ErrInput, len(w.d.Guess), len(w.d.Links))
	}
	if w.err != nil {
		return nil
	}
	var text bytes.Buffer
	for i, g := range w.d.Guess {
		if i == 0 && g == (rigid.Placement{}) {
			continue
		}
		place, err := json.Marshal(g)
		if err != nil {
			w.err = fmt.Errorf("twopoint: guess.%s: %w", w.d.Links[i], err)
			return nil
		}
		name, _ := json.Marshal(w.d.Links[i]) // a string always can be
		if text.Len() > 0 {
			text.WriteByte(',')
		}
		fmt.Fprintf(&text, "%s:%s", name, place)
	}
	return json.RawMessage("{" + text.String() + "}")
}

func (w *jsonWriter) name(l Link) string {
	if l < 0 || int(l) >= len(w.d.Links) {
		if w.bad = l; l == 0 {
			w.bad = -1
		}
		return ""
	}
	return w.d.Links[l]
}

func (w *jsonWriter) point(a Attachment) jsonPoint { return jsonPoint{w.name(a.Link), a.X, a.Y} }
func (w *jsonWriter) line(l Line) jsonLine         { return jsonLine{w.name(l.Link), l.X, l.Y, l.Angle} }
