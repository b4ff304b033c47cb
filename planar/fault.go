package planar

import (
	"strings"

	"example.com/twopoint/rigid"
)

// A groupError is why a group can't follow its drive: one value for each group and
// cause, made at New.
type groupError struct {
	links []string
	cause error
}

// Error returns a message that begins with "twopoint: " and names the links.
func (e *groupError) Error() string {
	return e.cause.Error() + " (links " + strings.Join(e.links, ", ") + ")"
}

// Unwrap returns rigid.ErrUnreachable, rigid.ErrSingular or ErrInconsistent.
func (e *groupError) Unwrap() error { return e.cause }

// A faults has a group's errors.
type faults struct{ unreachable, singular error }

// name makes the errors of the groups.
func (c *compiler) name(names []string) {
	for i := range c.groups {
		links := c.namesOf(i, names)
		c.faults = append(c.faults, faults{&groupError{links, rigid.ErrUnreachable}, &groupError{links, rigid.ErrSingular}})
	}
}

// namesOf returns the names of a group's links.
func (c *compiler) namesOf(group int, names []string) (links []string) {
	for _, l := range c.groups[group].Links {
		links = append(links, names[l])
	}
	return links
}

// fault returns the error of an op.
func (p *program) fault(op int, st status) error {
	f := faults{rigid.ErrUnreachable, rigid.ErrSingular}
	if g := p.groupOf[op]; g >= 0 {
		f = p.faults[g]
	}
	switch st {
	case singular:
		return f.singular
	case tooLong:
		return ErrTooFar
	}
	return f.unreachable
}
