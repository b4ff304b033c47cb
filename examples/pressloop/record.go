package main

import (
	"encoding/csv"
	"io"
	"iter"
	"strconv"

	"example.com/twopoint/rigid"
)

// A record is one tick.
type record struct {
	tick               int64
	commanded, stopped bool
	rate, margin       float64          // of the clock along the path; of the command
	ram, motor         rigid.Coordinate // as commanded for the next tick
	count              int64
	measured           float64 // motor, rad, looked ahead to the tick
	following          float64 // measured less commanded, rad
}

// A recorder keeps the last records; it allocates when made, not when used.
type recorder struct {
	ring []record
	n    int64 // records given so far
}

func newRecorder(size int64) *recorder { return &recorder{ring: make([]record, size)} }

func (r *recorder) add(x record) {
	r.ring[r.n%int64(len(r.ring))] = x
	r.n++
}

// all gives the records kept, oldest first.
func (r *recorder) all() iter.Seq[*record] {
	return func(yield func(*record) bool) {
		size := int64(len(r.ring))
		for i := max(0, r.n-size); i < r.n; i++ {
			if !yield(&r.ring[i%size]) {
				return
			}
		}
	}
}

var columns = []string{"time_s", "state", "clock_rate", "ram_m", "ram_speed", "ram_acc", "motor_rad", "motor_speed", "motor_acc",
	"margin", "count", "measured_rad", "following_rad", "stop_reason"}

// writeCSV writes the records. What is commanded in a row is for the tick after it;
// counts, measured place and following error are of the row's own.
func writeCSV(w io.Writer, r *recorder, dt float64, why halt) error {
	out := csv.NewWriter(w) // keeps the first error
	out.Write(columns)
	num := func(x float64) string { return strconv.FormatFloat(x, 'g', -1, 64) }
	row := make([]string, len(columns))
	for x := range r.all() {
		clear(row)
		row[0], row[1] = strconv.FormatFloat(float64(x.tick)*dt, 'g', 12, 64), x.state()
		if x.commanded {
			for i, v := range []float64{x.rate, x.ram.Pos, x.ram.Vel, x.ram.Acc, x.motor.Pos, x.motor.Vel, x.motor.Acc, x.margin} {
				row[2+i] = num(v)
			}
		}
		row[10] = strconv.FormatInt(x.count, 10)
		if x.measured != 0 || x.commanded {
			row[11], row[12] = num(x.measured), num(x.following)
		}
		if x.stopped && x.tick == why.tick {
			row[13] = why.String()
		}
		out.Write(row)
	}
	out.Flush()
	return out.Error()
}

func (x *record) state() string {
	switch {
	case x.stopped:
		return "stop"
	case x.commanded:
		return "run"
	}
	return "wait"
}
