package main

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

// A sample is one line of a log.
type sample struct {
	line   int
	time   float64 // s
	counts int64   // of the crank's encoder
	ram    float64 // m, measured
}

// A lineError is a malformed line; reading goes on after it.
type lineError struct {
	line int
	err  error
}

func (e *lineError) Error() string { return fmt.Sprintf("line %d: %v", e.line, e.err) }
func (e *lineError) Unwrap() error { return e.err }

var columns = []string{"time_s", "crank_counts", "ram_m"}

// samples reads a log one line at a time, so that its length does not matter. A
// malformed line comes as a *lineError; any other error is the last.
func samples(r io.Reader) iter.Seq2[sample, error] {
	return func(yield func(sample, error) bool) {
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
				yield(sample{}, err)
				return
			}
			if bad != nil {
				err = &lineError{bad.StartLine, bad.Err}
				if !yield(sample{}, err) {
					return
				}
				continue
			}
			line, _ := in.FieldPos(0)
			if first && strings.TrimPrefix(row[0], "\ufeff") == columns[0] {
				continue
			}
			s, err := parseSample(line, row)
			if err != nil {
				err = &lineError{line, err}
			}
			if !yield(s, err) {
				return
			}
		}
	}
}

func parseSample(line int, row []string) (sample, error) {
	s := sample{line: line}
	var err [3]error
	s.time, err[0] = strconv.ParseFloat(row[0], 64)
	s.counts, err[1] = strconv.ParseInt(row[1], 10, 64)
	s.ram, err[2] = strconv.ParseFloat(row[2], 64)
	for i, x := range []float64{s.time, 0, s.ram} {
		if err[i] == nil && (math.IsNaN(x) || math.IsInf(x, 0)) {
			err[i] = fmt.Errorf("%s %q: %w", columns[i], row[i], rigid.ErrNotFinite)
		} else if err[i] != nil {
			err[i] = fmt.Errorf("%s %q: %w", columns[i], row[i], errors.Unwrap(err[i]))
		}
	}
	return s, errors.Join(err[:]...)
}
