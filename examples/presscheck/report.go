package main

import "math"

// The names of what can be wrong, as they stand in the verdict.
const (
	faultSlip     = "slip"
	faultCounts   = "missed counts"
	faultLink     = "link" // followed by its name, where the log tells which
	faultPattern  = "pattern"
	faultScatter  = "scatter"
	faultGlitches = "glitches"
	faultMotion   = "motion"
)

// An estimate is a number with its standard error.
type estimate struct {
	Value float64 `json:"value"`
	Error float64 `json:"error"`
}

const sigmas = 5 // standard errors that are no chance

// beyond reports whether it is more than a tolerance, and not by chance.
func (e estimate) beyond(tolerance float64) bool {
	return math.Abs(e.Value) > max(tolerance, sigmas*e.Error)
}

// A report is what a log says about a press.
type report struct {
	Log         logged
	Calibration calibration
	Slip        slip
	Jumps       []jumped
	MoreJumps   int // not followed one by one
	Links       links
	Pattern     pattern
	Motion      motions
	Verdict     verdict
}

// logged says what was read.
type logged struct {
	Samples  int     `json:"samples"`
	Skipped  int     `json:"skipped"`  // malformed lines
	Glitches int     `json:"glitches"` // samples off alone
	Turns    int     `json:"turns"`    // whole
	LeftOut  int     `json:"leftOut"`  // turns too unlike the others to tell of lengths
	Seconds  float64 `json:"seconds"`
}

// A calibration is by what the press was set.
type calibration struct {
	EncoderZero estimate `json:"encoderZero"` // counts, at the log's start
	ScaleOffset estimate `json:"scaleOffset"` // m
	Scatter     float64  `json:"scatter"`     // m, root mean square
}

// A slip is by how much the crank went off its encoder little by little: negative
// where it fell behind.
type slip struct {
	Total   estimate `json:"total"`   // rad, from the mean over the first turn to that over the last
	PerTurn float64  `json:"perTurn"` // rad, median
}

// A jumped is a jump of the counts with what the ram says of it.
type jumped struct {
	jump
	Ram     *estimate `json:"ram"`     // counts, by the ram; null where it can't tell
	Refuted bool      `json:"refuted"` // the ram went along: the machine moved so
}

// A link is the error of one length.
type link struct {
	Name string `json:"name"`
	estimate
}

// links tells which length explains the pattern over the turn.
type links struct {
	Judged bool     `json:"judged"`
	All    []link   `json:"all"`    // if all three may be wrong
	Wrong  []link   `json:"wrong"`  // beyond tolerance: one; or several, of which any may be the one; or, if Joint, all together
	Joint  bool     `json:"joint"`  // no length explains the pattern alone
	Untold []string `json:"untold"` // whose tolerance is finer than the log can tell
}

// A pattern is the mean difference that is left in a part of the turn, the worst.
type pattern struct {
	Worst estimate `json:"worst"` // m
	Crank float64  `json:"crank"` // rad
}

// motions tells how often the ram moved otherwise than the press as drawn, and the
// worst instant.
type motions struct {
	Windows  int     `json:"windows"`
	Differ   int     `json:"differ"`
	Time     float64 `json:"time"` // s
	Measured motion  `json:"measured"`
	Ideal    motion  `json:"ideal"`
	Diff     string  `json:"-"`
}

// A verdict closes a report.
type verdict struct {
	Pass   bool     `json:"pass"`
	Faults []string `json:"faults"`
	Why    string   `json:"why,omitempty"` // it could not be checked
}

// status is the exit status of a program.
func (v *verdict) status() int {
	switch {
	case v.Why != "":
		return 2
	case v.Pass:
		return 0
	}
	return 1
}
