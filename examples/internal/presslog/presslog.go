// Package presslog reads the recordings of the invented roof-tile press: lines of a
// time in s, the counts of an encoder and the measured ram in m.
package presslog

import (
	"encoding/csv"
	"errors"
	"fmt"
	"io"
	"iter"
	"math"
	"strconv"
	"strings"

	"example.com/twopoint/rigid"
)

// A Sample is one line of a log.
type Sample struct {
	Line   int
	Time   float64 // s
	Counts int64
	Ram    float64 // m, measured
}

// ErrOrder: the time of a sample is not after that of the last one taken, which is for
// the reader's caller to tell, who may have refused that one.
var ErrOrder = errors.New("time_s is not after that of the line before")

// A LineError is a malformed line; reading goes on after it.
type LineError struct {
	Line int
	Err  error
}

func (e *LineError) Error() string { return fmt.Sprintf("line %d: %v", e.Line, e.Err) }

// Unwrap returns what is wrong with the line.
func (e *LineError) Unwrap() error { return e.Err }

// Samples reads a log one line at a time, so that its length does not matter. The
// columns are time_s, one of the given name for the counts, and ram_m; a first line
// that says so is left out. A malformed line comes as a *LineError; any other error
// is the last.
func Samples(r io.Reader, counts string) iter.Seq2[Sample, error] {
	columns := [3]string{"time_s", counts, "ram_m"}
	return func(yield func(Sample, error) bool) {
		in := csv.NewReader(r)
		in.FieldsPerRecord = len(columns)
		in.ReuseRecord = true
		in.TrimLeadingSpace = true
		for first := true; ; first = false {
			row, err := in.Read()
			if err == io.EOF {
				return
			}
			var bad *csv.ParseError
			if err != nil && !errors.As(err, &bad) {
				yield(Sample{}, err)
				return
			}
			if bad != nil {
				err = &LineError{bad.StartLine, bad.Err}
				if !yield(Sample{}, err) {
					return
				}
				continue
			}
			line, _ := in.FieldPos(0)
			if first && strings.TrimPrefix(row[0], "\ufeff") == columns[0] {
				continue
			}
			s, err := parse(columns, row)
			s.Line = line
			if err != nil {
				err = &LineError{line, err}
			}
			if !yield(s, err) {
				return
			}
		}
	}
}

func parse(columns [3]string, row []string) (Sample, error) {
	var s Sample
	var err [3]error
	s.Time, err[0] = strconv.ParseFloat(row[0], 64)
	s.Counts, err[1] = strconv.ParseInt(row[1], 10, 64)
	s.Ram, err[2] = strconv.ParseFloat(row[2], 64)
	for i, x := range [3]float64{s.Time, 0, s.Ram} {
		if err[i] == nil && (math.IsNaN(x) || math.IsInf(x, 0)) {
			err[i] = fmt.Errorf("%s %q: %w", columns[i], row[i], rigid.ErrNotFinite)
		} else if err[i] != nil {
			err[i] = fmt.Errorf("%s %q: %w", columns[i], row[i], errors.Unwrap(err[i]))
		}
	}
	return s, errors.Join(err[:]...)
}
