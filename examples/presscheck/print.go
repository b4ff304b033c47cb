package main

import (
	"encoding/json"
	"fmt"
	"io"
	"math"
	"strings"

	"example.com/twopoint/rigid"
)

// lines prints a report as JSON lines: an object with one key, what it is, for each.
func (r *report) lines(w io.Writer) error {
	enc := json.NewEncoder(w)
	for _, l := range []struct {
		key   string
		value any
	}{
		{"log", r.Log}, {"calibration", r.Calibration}, {"slip", r.Slip}, {"jumps", r.Jumps}, {"links", r.Links},
		{"pattern", r.Pattern}, {"motion", r.Motion}, {"verdict", r.Verdict},
	} {
		if err := enc.Encode(map[string]any{l.key: l.value}); err != nil {
			return err
		}
	}
	return nil
}

// text prints a report for people.
func (r *report) text(w io.Writer, t *tolerance) {
	line := func(what, format string, args ...any) {
		fmt.Fprintf(w, "%-13s %s\n", what, fmt.Sprintf(format, args...))
	}
	l, c := &r.Log, &r.Calibration
	fmt.Fprintln(w, "Roof-tile press, an invented machine. Ideal kinematics, not a safety function.")
	fmt.Fprintln(w)
	line("log", "%d samples, %d skipped, %d glitches, %d turns (%d unlike the others), %.1f s", l.Samples, l.Skipped, l.Glitches, l.Turns, l.LeftOut, l.Seconds)
	line("encoder zero", "%s counts", c.EncoderZero.show(1))
	line("ram scale", "reads %s mm too much, scatters by %.3f mm", c.ScaleOffset.show(rigid.Millimetre), c.Scatter/rigid.Millimetre)
	line("slip", "%s mrad from the first turn to the last, %.3f a turn (tolerance %g)", r.Slip.Total.show(1e-3), r.Slip.PerTurn*1e3, t.Slip*1e3)
	r.textJumps(line)
	r.textLinks(line, t)
	line("pattern", "%s mm left at crank %.0f deg (tolerance %g)", r.Pattern.Worst.show(rigid.Millimetre), r.Pattern.Crank/rigid.Degree, t.Pattern/rigid.Millimetre)
	m := &r.Motion
	line("ram motion", "%d of %d windows differ from the press as drawn; the worst at %.3f s by %+.3f mm, %+.4f m/s, %+.3f m/s²", m.Differ, m.Windows, m.Time,
		(m.Measured.Ram.Pos-m.Ideal.Ram.Pos)/rigid.Millimetre, m.Measured.Ram.Vel-m.Ideal.Ram.Vel, m.Measured.Ram.Acc-m.Ideal.Ram.Acc)
	if m.Diff != "" {
		fmt.Fprintf(w, "  ideal -, measured +\n  %s\n", strings.ReplaceAll(strings.TrimSpace(m.Diff), "\n", "\n  "))
	}
	fmt.Fprintf(w, "\n%s\n", r.Verdict.String())
}

func (r *report) textJumps(line func(what, format string, args ...any)) {
	if len(r.Jumps) == 0 {
		line("counts", "no jump")
	}
	for _, j := range r.Jumps {
		says := "the ram can't tell"
		if j.Refuted {
			says = "no: the ram went along"
		} else if j.Ram != nil {
			says = fmt.Sprintf("by the ram %s", j.Ram.show(1))
		}
		line("counts", "jumped by %+d at %.3f s; %s", j.Counts, j.Time, says)
	}
	if r.MoreJumps > 0 {
		line("counts", "jumped %d times more", r.MoreJumps)
	}
}

func (r *report) textLinks(line func(what, format string, args ...any), t *tolerance) {
	if !r.Links.Judged {
		line("links", "not judged, since the zero goes off")
		return
	}
	var all []string
	for i, l := range r.Links.All {
		all = append(all, fmt.Sprintf("%s %s (%g)", l.Name, l.show(rigid.Millimetre), t.of(lengths[i].at)/rigid.Millimetre))
	}
	line("links", "if all may be off, in mm (tolerance): %s", strings.Join(all, ", "))
	how := "alone explains the pattern over the turn"
	if r.Links.Joint {
		how = "together with the others"
	} else if len(r.Links.Wrong) > 1 {
		how = "would explain it alone; the log does not tell which"
	}
	for _, l := range r.Links.Wrong {
		line("links", "%s is off by %s mm: %s", l.Name, l.show(rigid.Millimetre), how)
	}
}

// show writes an estimate in a unit, with two digits of its standard error.
func (e estimate) show(unit float64) string {
	err := math.Abs(e.Error / unit)
	digits := min(max(int(math.Ceil(1-math.Log10(err))), 0), 6)
	return fmt.Sprintf("%+.*f ± %.*f", digits, e.Value/unit, digits, err)
}

// String returns the verdict as one line.
func (v *verdict) String() string {
	switch v.status() {
	case 0:
		return "PASS"
	case 1:
		return "FAIL: " + strings.Join(v.Faults, ", ")
	}
	return "COULD NOT CHECK: " + v.Why
}
