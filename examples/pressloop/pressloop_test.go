package main

import (
	"context"
	"encoding/csv"
	"errors"
	"flag"
	"io"
	"math"
	"os"
	"path/filepath"
	"strconv"
	"strings"
	"testing"

	"example.com/twopoint/rigid"
)

func TestSample(t *testing.T) {
	out, _, err := press(t)
	if err != nil {
		t.Fatal(err)
	}
	for _, want := range []string{"an invented machine", "not a safety", "slowest clock 0.8", "stop command: program done", "shows rest", "lost 0;", "allocations and 0 garbage"} {
		if !strings.Contains(out, want) {
			t.Errorf("%q is not in\n%s", want, out)
		}
	}
}

func TestConfig(t *testing.T) {
	good := string(samplePress)
	for _, c := range []struct{ why, old, new, want string }{
		{"an unknown field", `"tick"`, `"tik"`, `"tik"`},
		{"an unknown field inside", `"follow"`, `"folow"`, `"folow"`},
		{"a wrong length", `"rod": 0.480`, `"rod": -1`, "Rod"},
		{"a gear of nothing", `"gear": 20`, `"gear": 0`, "gear"},
		{"no counts", `"perTurn": 8192`, `"perTurn": 0`, "encoder.perTurn"},
		{"a place out of reach", `"to": 0.590`, `"to": 0.7`, "moves[1].to: 0.7"},
		{"no speed", `"speed": 0.05`, `"speed": 0`, "moves[1].speed"},
		{"a start out of reach", `"start": 0.385`, `"start": 0`, "start: 0"},
		{"margins the wrong way round", `"margin": 0.18`, `"margin": 0.3`, "limits.margin"},
		{"a side that is none", `"knee": "left"`, `"knee": "up"`, "press"},
		{"an endless rest", `"dwell": 0.15`, `"dwell": 7000`, "moves[1].dwell"},
		{"a slow program", `"speed": 0.05`, `"speed": 1e-5`, "600 s"},
		{"a number that overflows", `"gear": 20`, `"gear": 1e999`, "1e999"},
	} {
		text := strings.Replace(good, c.old, c.new, 1)
		if text == good {
			t.Fatalf("%s: nothing is replaced", c.why)
		}
		if _, _, err := press(t, "-config", file(t, "press.json", text)); err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%s: %v, want %q", c.why, err, c.want)
		}
	}
	if _, _, err := press(t, "-config", file(t, "press.json", good+"{}")); err == nil || !strings.Contains(err.Error(), "more than one") {
		t.Errorf("two values: %v", err)
	}
	if _, _, err := press(t, "-config", filepath.Join(t.TempDir(), "none.json")); !errors.Is(err, os.ErrNotExist) {
		t.Errorf("no file: %v", err)
	}
	open := strings.Replace(good, `"to": 0.385`, `"to": 0.4`, 1)
	if _, _, err := press(t, "-cycles", "2", "-config", file(t, "press.json", open)); err == nil || !strings.Contains(err.Error(), "end at the start") {
		t.Errorf("an open program twice: %v", err)
	}
	near := strings.Replace(strings.Replace(good, `"start": 0.385`, `"start": 0.3598`, 1), `"to": 0.385`, `"to": 0.3598`, 1)
	if _, _, err := press(t, "-config", file(t, "press.json", near)); err == nil || !strings.Contains(err.Error(), "start: within margin") {
		t.Errorf("a start at a dead centre: %v", err)
	}
}

func TestFlags(t *testing.T) {
	for _, args := range [][]string{{"-every", "0"}, {"-cycles", "0"}, {"run.csv"}, {"-fault", "flood"}, {"-nonsense"},
		{"-at", "0.3"}, {"-fault", "jam", "-at", "NaN"}, {"-fault", "jam", "-at", "Inf"}, {"-fault", "jam", "-at", "1.8"}} {
		if _, _, err := press(t, args...); err == nil || err == errStopped {
			t.Errorf("%v: %v", args, err)
		}
	}
	_, help, err := press(t, "-h")
	if !errors.Is(err, flag.ErrHelp) {
		t.Errorf("help: %v", err)
	}
	for _, want := range []string{"-realtime", "missed-counts", "Exit status", "not a safety function"} {
		if !strings.Contains(help, want) {
			t.Errorf("help has no %q", want)
		}
	}
}

// The log holds each tick, and the reason at the stop command; nothing else is left
// in its folder, also when a stop is requested before or while the loop runs.
func TestLog(t *testing.T) {
	cancelled, cancel := context.WithCancel(context.Background())
	cancel()
	for _, c := range []struct {
		ctx  context.Context
		args []string
		want string
	}{
		{context.Background(), nil, "program done"},
		{context.Background(), []string{"-fault", "glitch"}, "encoder: step"},
		{context.Background(), []string{"-fault", "stop-request"}, "stop requested"},
		{cancelled, nil, "stop requested"},
	} {
		dir := t.TempDir()
		path := filepath.Join(dir, "run.csv")
		if err := run(c.ctx, append(c.args, "-log", path), io.Discard, io.Discard); err != nil && err != errStopped {
			t.Fatal(err)
		}
		checkLog(t, path, c.want)
		if left, _ := os.ReadDir(dir); len(left) != 1 {
			t.Errorf("left in the folder: %v", left)
		}
	}
}

func checkLog(t *testing.T, path, want string) {
	t.Helper()
	f, err := os.Open(path)
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	rows, err := csv.NewReader(f).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	reasons := 0
	for i, row := range rows[1:] {
		at, err := strconv.ParseFloat(row[0], 64)
		if err != nil || math.Abs(at-float64(i+1)*0.001) > 1e-9 {
			t.Fatalf("row %d: %v", i+2, row)
		}
		if row[13] != "" {
			reasons++
			if !strings.Contains(row[13], want) || row[1] != "stop" {
				t.Errorf("row %d: %v, want %q", i+2, row, want)
			}
		}
	}
	if reasons != 1 || rows[len(rows)-1][1] != "stop" {
		t.Errorf("%d rows, %d reasons", len(rows), reasons)
	}
}

// What can't be written is told, before the loop where that is known.
func TestUnwritable(t *testing.T) {
	dir := t.TempDir()
	for _, path := range []string{filepath.Join(dir, "none", "run.csv"), dir} {
		out, _, err := press(t, "-log", path)
		if err == nil || !strings.Contains(err.Error(), "can't write "+path) || out != "" {
			t.Errorf("%s: %v, printed %q", path, err, out)
		}
	}
	if _, _, err := press(t, "-log", dir); err == nil || !strings.HasSuffix(err.Error(), "not a file") {
		t.Errorf("a folder is found too late: %v", err)
	}
	r := newRig(t, sampleConfig(t), options{})
	r.loop.run()
	if err := writeCSV(full{}, r.loop.rec, 0.001, r.loop.stopped); !errors.Is(err, errFull) {
		t.Errorf("a full disk: %v", err)
	}
	if err := run(context.Background(), nil, full{}, io.Discard); !errors.Is(err, errFull) {
		t.Errorf("a full standard output: %v", err)
	}
}

type full struct{}

var errFull = errors.New("no space left")

func (full) Write([]byte) (int, error) { return 0, errFull }

// The recorder keeps the last records, in order.
func TestRecorder(t *testing.T) {
	r := newRecorder(3)
	for i := range int64(8) {
		r.add(record{tick: i})
	}
	var got []int64
	for x := range r.all() {
		got = append(got, x.tick)
	}
	if len(got) != 3 || got[0] != 5 || got[2] != 7 {
		t.Errorf("%v", got)
	}
}

// Of a motor that accelerates evenly the meter tells where it is now, from samples
// that are late: off by half a count and what the look-ahead makes of it.
func TestMeterLooksAhead(t *testing.T) {
	c := sampleConfig(t)
	m, err := newMeter(c)
	if err != nil {
		t.Fatal(err)
	}
	motor := rigid.Coordinate{Pos: -40, Vel: 30, Acc: 400}
	worst, plain := 0.0, 0.0
	for tick := int64(1); tick < 200; tick++ {
		old := tick - c.Latency
		count, err := c.Encoder.Count(0, motor.After(float64(old)*c.Tick).Pos)
		if err != nil {
			t.Fatal(err)
		}
		if h := m.take(tick, sample{old, count}); h.why != goOn {
			t.Fatal(h)
		}
		if m.ready {
			is := motor.After(float64(tick) * c.Tick).Pos
			worst = max(worst, math.Abs(m.now(tick).Pos-is))
			plain = max(plain, math.Abs(m.motion.Pos-is))
		}
	}
	if count := rigid.Revolution / float64(c.Encoder.PerTurn); worst > 3*count || plain < 100*count {
		t.Errorf("off by %g rad, without look-ahead by %g", worst, plain)
	}
}
