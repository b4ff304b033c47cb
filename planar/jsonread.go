package planar

import (
	"encoding/json"
	"fmt"
	"slices"

	"example.com/twopoint/rigid"
)

// UnmarshalJSON reads what MarshalJSON writes. Joints, drives, the guess, numbers and
// flags may be left out: they are none or zero. A guess, if there is one, names every
// link but the frame. It is strict: a key or kind that does not belong there, in upper
// or lower case, a key twice, null, two links of one name, the name of no link and a
// link missing in the guess are errors that wrap rigid.ErrInput or ErrReference and
// tell the place. The design is then as it was. Whether the linkage is sound is for
// New to say.
func (d *Design) UnmarshalJSON(text []byte) error {
	var read Design
	var links, joints, drives, guess []byte
	err := object("", text, fields{"links": keep(&links), "joints": keep(&joints), "drives": keep(&drives), "guess": keep(&guess)}, "links")
	if err != nil {
		return err
	}
	r := jsonReader{links: map[string]Link{}}
	err = array("links", links, func(at string, text []byte) error {
		var name string
		if err := scalar(&name)(at, text); err != nil {
			return err
		}
		if _, ok := r.links[name]; ok {
			return fmt.Errorf("%w: %s: two links of the name %q", ErrReference, at, name)
		}
		r.links[name] = Link(len(read.Links))
		read.Links = append(read.Links, name)
		return nil
	})
	if err == nil && joints != nil {
		read.Joints, err = kinds("joints", joints, r.joint)
	}
	if err == nil && drives != nil {
		read.Drives, err = kinds("drives", drives, r.drive)
	}
	if err == nil && guess != nil {
		read.Guess, err = r.guess("guess", guess, read.Links)
	}
	if err == nil {
		*d = read
	}
	return err
}

// kinds reads a list of objects of one key, their kind.
func kinds[T any](at string, text []byte, read func(at, kind string, text []byte) (T, error)) (all []T, err error) {
	err = array(at, text, func(at string, text []byte) error {
		var names []string
		var value []byte
		err := members(at, text, func(kind string, text []byte) error {
			names, value = append(names, kind), text
			return nil
		})
		switch {
		case err != nil:
			return err
		case len(names) != 1:
			return fmt.Errorf("%w: %s has %d keys, not its kind alone", rigid.ErrInput, at, len(names))
		}
		one, err := read(at+"."+names[0], names[0], value)
		all = append(all, one)
		return err
	})
	return all, err
}

// A jsonReader knows the links by name.
type jsonReader struct{ links map[string]Link }

func (r jsonReader) joint(at, kind string, text []byte) (Joint, error) {
	switch kind {
	case "revolute":
		var j Revolute
		err := object(at, text, fields{"a": r.point(&j.A), "b": r.point(&j.B)}, "a", "b")
		return j, err
	case "prismatic":
		var j Prismatic
		err := object(at, text, fields{"a": r.line(&j.A), "b": r.line(&j.B)}, "a", "b")
		return j, err
	case "slidingPin":
		var j SlidingPin
		err := object(at, text, fields{"pin": r.point(&j.Pin), "slot": r.line(&j.Slot)}, "pin", "slot")
		return j, err
	case "fixed":
		var j Fixed
		err := object(at, text, fields{"a": r.line(&j.A), "b": r.line(&j.B)}, "a", "b")
		return j, err
	case "gearPair":
		var j GearPair
		err := object(at, text, fields{
			"a": r.link(&j.A), "b": r.link(&j.B), "arm": r.link(&j.Arm), "teethA": scalar(&j.TeethA), "teethB": scalar(&j.TeethB),
			"radiusA": scalar(&j.RadiusA), "radiusB": scalar(&j.RadiusB), "internal": scalar(&j.Internal),
			"phase": scalar(&j.Phase), "asAssembled": scalar(&j.AsAssembled),
		}, "a", "b", "arm")
		return j, err
	case "rackPair":
		var j RackPair
		err := object(at, text, fields{
			"pinion": r.point(&j.Pinion), "rack": r.line(&j.Rack), "radius": scalar(&j.Radius),
			"right": scalar(&j.Right), "phase": scalar(&j.Phase), "asAssembled": scalar(&j.AsAssembled),
		}, "pinion", "rack", "radius")
		return j, err
	}
	return nil, fmt.Errorf("%w: %s: no kind of joint; those are revolute, prismatic, slidingPin, fixed, gearPair, rackPair", rigid.ErrInput, at)
}

func (r jsonReader) drive(at, kind string, text []byte) (Drive, error) {
	switch kind {
	case "turn":
		var m Turn
		err := object(at, text, fields{"of": r.link(&m.Of), "from": r.link(&m.From)}, "of", "from")
		return m, err
	case "slide":
		var m Slide
		err := object(at, text, fields{"of": r.line(&m.Of), "from": r.line(&m.From)}, "of", "from")
		return m, err
	case "reach":
		var m Reach
		err := object(at, text, fields{"a": r.point(&m.A), "b": r.point(&m.B)}, "a", "b")
		return m, err
	}
	return nil, fmt.Errorf("%w: %s: no kind of drive; those are turn, slide, reach", rigid.ErrInput, at)
}

// guess reads placements by the names of links, of which the frame's may be missing.
func (r jsonReader) guess(at string, text []byte, links []string) ([]rigid.Placement, error) {
	all, named := make([]rigid.Placement, len(links)), fields{}
	for i, name := range links {
		g := &all[i]
		named[name] = func(at string, text []byte) error {
			return object(at, text, fields{"x": scalar(&g.X), "y": scalar(&g.Y), "angle": scalar(&g.Angle)})
		}
	}
	return all, object(at, text, named, links[min(1, len(links)):]...)
}

func (r jsonReader) link(to *Link) field {
	return func(at string, text []byte) error {
		var name string
		if err := scalar(&name)(at, text); err != nil {
			return err
		}
		l, ok := r.links[name]
		if !ok {
			return fmt.Errorf("%w: %s: no link has the name %q", ErrReference, at, name)
		}
		*to = l
		return nil
	}
}

func (r jsonReader) point(to *Attachment) field {
	return func(at string, text []byte) error {
		return object(at, text, fields{"link": r.link(&to.Link), "x": scalar(&to.X), "y": scalar(&to.Y)}, "link")
	}
}

func (r jsonReader) line(to *Line) field {
	return func(at string, text []byte) error {
		return object(at, text, fields{"link": r.link(&to.Link), "x": scalar(&to.X), "y": scalar(&to.Y), "angle": scalar(&to.Angle)}, "link")
	}
}

// A field reads the value at a place. Fields are those of an object, by key.
type (
	field  func(at string, text []byte) error
	fields map[string]field
)

func keep(to *[]byte) field {
	return func(_ string, text []byte) error {
		*to = text
		return nil
	}
}

// scalar reads a string, a number or a flag.
func scalar[T string | float64 | int | bool](to *T) field {
	return func(at string, text []byte) error {
		var read *T // null leaves it nil
		err := json.Unmarshal(text, &read)
		if err != nil || read == nil {
			return fmt.Errorf("%w: %s: %.40s is no %T", rigid.ErrInput, at, text, *to)
		}
		*to = *read
		return nil
	}
}

// object reads an object that has these fields and no others.
func object(at string, text []byte, f fields, required ...string) error {
	var seen []string
	err := members(at, text, func(key string, text []byte) error {
		read, ok := f[key]
		if !ok {
			return fmt.Errorf("%w: %s: unknown key", rigid.ErrInput, under(at, key))
		}
		seen = append(seen, key)
		return read(under(at, key), text)
	})
	for _, key := range required {
		if err == nil && !slices.Contains(seen, key) {
			err = fmt.Errorf("%w: %s is missing", rigid.ErrInput, under(at, key))
		}
	}
	return err
}

func under(at, key string) string {
	if at == "" {
		return key
	}
	return at + "." + key
}
