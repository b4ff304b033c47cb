package main

import (
	"bytes"
	"context"
	"encoding/json"
	"errors"
	"flag"
	"io"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"time"
)

func press(t *testing.T, stdin io.Reader, args ...string) (status int, stdout, stderr string, err error) {
	t.Helper()
	var out, errs bytes.Buffer
	status, err = run(t.Context(), args, stdin, &out, &errs)
	return status, out.String(), errs.String(), err
}

// line is one line of -json, of any kind.
type line struct {
	Log         *logged
	Calibration *calibration
	Slip        *slip
	Jumps       []jumped
	Links       *links
	Verdict     *verdict
}

// all reads JSON lines into one.
func all(t *testing.T, out string) (l line) {
	t.Helper()
	n := 0
	for dec := json.NewDecoder(strings.NewReader(out)); ; n++ {
		if err := dec.Decode(&l); err == io.EOF {
			break
		} else if err != nil {
			t.Fatal(err)
		}
	}
	if n != 8 || n != strings.Count(out, "\n") {
		t.Errorf("%d JSON values in %d lines", n, strings.Count(out, "\n"))
	}
	return l
}

// Each log gives its own fault and no other; what is off is told by how much, as
// make_logs.py made it.
func TestLogs(t *testing.T) {
	near := func(e estimate, want, within float64) bool {
		return e.Error < within/2 && e.Value > want-within && e.Value < want+within
	}
	link := func(l line, want, within float64) bool {
		return len(l.Links.Wrong) == 1 && near(l.Links.Wrong[0].estimate, want, within)
	}
	for _, c := range []struct {
		log, verdict string
		status       int
		found        func(line) bool
	}{
		{"good", "PASS", 0, func(l line) bool { return len(l.Jumps) == 0 && l.Links.Wrong == nil }},
		{"slip-belt", "FAIL: slip", 1, func(l line) bool { return near(estimate{l.Slip.PerTurn, 0}, -0.4e-3, 0.03e-3) }},
		{"slip-clutch", "FAIL: slip", 1, func(l line) bool { return near(l.Slip.Total, -15e-3, 0.1e-3) }},
		{"missed-counts", "FAIL: missed counts", 1, func(l line) bool {
			return len(l.Jumps) == 2 && near(*l.Jumps[0].Ram, -37, 0.5) && near(*l.Jumps[1].Ram, 22, 0.5)
		}},
		{"fading-counts", "FAIL: missed counts", 1, func(l line) bool { return near(estimate{l.Slip.PerTurn, 0}, 1.5*0.307e-3, 0.05e-3) }},
		{"crank", "FAIL: link: crank", 1, func(l line) bool { return link(l, 0.4e-3, 0.005e-3) }},
		{"rod", "FAIL: link: rod", 1, func(l line) bool { return link(l, -1.2e-3, 0.15e-3) }},
		{"offset", "FAIL: link: offset", 1, func(l line) bool { return link(l, 1.5e-3, 0.1e-3) }},
	} {
		path := filepath.Join("logs", c.log+".csv")
		status, out, errs, err := press(t, nil, "-log", path, "-json")
		if err != nil || status != c.status {
			t.Errorf("%s: status %d, %v", c.log, status, err)
			continue
		}
		l := all(t, out)
		if got := l.Verdict.String(); got != c.verdict || !c.found(l) {
			t.Errorf("%s: %s, want %s:\n%s", c.log, got, c.verdict, out)
		}
		if l.Log.Skipped != 1 || l.Log.Glitches != 1 || !strings.Contains(errs, "line 557") {
			t.Errorf("%s: %+v, said %q", c.log, l.Log, errs)
		}
		// the encoder's zero of all logs is at 6234, and floor puts counts half a one low
		if z := l.Calibration.EncoderZero; c.log != "offset" && !near(z, 6233.5, 0.5) {
			t.Errorf("%s: encoder zero %+v", c.log, z)
		}
		status, out, _, err = press(t, nil, "-log", path)
		if err != nil || status != c.status || !strings.HasSuffix(out, "\n"+c.verdict+"\n") || !strings.Contains(out, "not a safety function") {
			t.Errorf("%s: status %d, %v, text:\n%s", c.log, status, err, out)
		}
	}
}

func TestStrictStops(t *testing.T) {
	status, out, _, err := press(t, nil, "-strict")
	if status != 2 || out != "" || err == nil || !strings.Contains(err.Error(), "line 557") {
		t.Errorf("%d, %v, %q", status, err, out)
	}
}

// Lines that can't be are told with their number, whatever is wrong with them.
func TestMalformedLines(t *testing.T) {
	lines := strings.Split(string(goodLog(t)), "\n")
	lines[99] = lines[98]                           // the same time again: line 100
	lines[199] = "1,2"                              // line 200
	lines[299] = "NaN,6300,0.5"                     // line 300
	lines[399] = lines[399][:6] + ",1e3,0.5"        // line 400
	lines[499] = "5.0,-9223372036854775808,\"0.5\"" // line 500: beyond an int64, less the zero
	status, out, errs, err := press(t, strings.NewReader(strings.Join(lines, "\n")), "-log", "-")
	if status != 0 || err != nil || !strings.Contains(out, "6 skipped") {
		t.Errorf("%d, %v\n%s", status, err, out)
	}
	for _, n := range []string{"100", "200", "300", "400", "500", "557"} {
		if !strings.Contains(errs, "line "+n+":") {
			t.Errorf("line %s is not told: %s", n, errs)
		}
	}
}

func goodLog(t *testing.T) []byte {
	t.Helper()
	data, err := os.ReadFile("logs/good.csv")
	if err != nil {
		t.Fatal(err)
	}
	return data
}

func TestConfig(t *testing.T) {
	text := string(sampleConfig)
	for _, c := range []struct{ why, from, to, want string }{
		{"an unknown field", `"slip"`, `"slipp"`, "slipp"},
		{"a wrong length", `"rod": 0.480`, `"rod": -0.480`, "Rod"},
		{"a crank that can't turn", `"rod": 0.480`, `"rod": 0.130`, "press.rod"},
		{"no gear", `"gear": 5,`, ``, "gear"},
		{"no encoder", `"perTurn": 4096, `, ``, "encoder.perTurn"},
		{"one turn", `"turns": 3`, `"turns": 1`, "turns"},
		{"a short window", `"window": 25`, `"window": 3`, "window"},
		{"no tolerance", `"pattern": 0.00005`, `"pattern": 0`, "tolerance.pattern"},
		{"a tolerance below 0", `"vel": 0.005`, `"vel": -1`, "tolerance.motion.vel"},
		{"two values", "\n}", "\n} {}", "more than one"},
	} {
		bad := strings.Replace(text, c.from, c.to, 1)
		if bad == text {
			t.Fatalf("%s: nothing changed", c.why)
		}
		if c.why == "two values" {
			bad = text + "{}"
		}
		path := filepath.Join(t.TempDir(), "press.json")
		if err := os.WriteFile(path, []byte(bad), 0o644); err != nil {
			t.Fatal(err)
		}
		status, _, _, err := press(t, nil, "-config", path)
		if status != 2 || err == nil || !strings.Contains(err.Error(), c.want) || !strings.Contains(err.Error(), "press.json") {
			t.Errorf("%s: %d, %v, want %q in it", c.why, status, err, c.want)
		}
	}
	if status, _, _, err := press(t, nil, "-config", "none.json"); status != 2 || !errors.Is(err, os.ErrNotExist) {
		t.Errorf("no file: %d, %v", status, err)
	}
}

func TestFlags(t *testing.T) {
	for _, args := range [][]string{{"good.csv"}, {"-log", "none.csv"}, {"-no-such-flag"}, {"-log", "-"}} {
		if status, _, _, err := press(t, strings.NewReader(""), args...); status != 2 || err == nil {
			t.Errorf("%v: %d, %v", args, status, err)
		}
	}
	status, _, help, err := press(t, nil, "-h")
	if status != 0 || !errors.Is(err, flag.ErrHelp) || !strings.Contains(help, "Exit status") || !strings.Contains(help, "-report") {
		t.Errorf("help: %d, %v, %q", status, err, help)
	}
}

// only returns the names in a folder.
func only(t *testing.T, dir string) (names []string) {
	t.Helper()
	list, err := os.ReadDir(dir)
	if err != nil {
		t.Fatal(err)
	}
	for _, e := range list {
		names = append(names, e.Name())
	}
	return names
}

func TestReportFile(t *testing.T) {
	dir := t.TempDir()
	path := filepath.Join(dir, "report.txt")
	status, out, _, err := press(t, nil, "-log", "logs/rod.csv", "-report", path)
	if status != 1 || err != nil || out != "FAIL: link: rod\n" {
		t.Errorf("%d, %v, %q", status, err, out)
	}
	data, err := os.ReadFile(path)
	if err != nil || !strings.HasSuffix(string(data), "FAIL: link: rod\n") || len(only(t, dir)) != 1 {
		t.Errorf("%v, %v:\n%s", err, only(t, dir), data)
	}
	// a log that can't be checked leaves the report of before as it was
	if status, _, _, err := press(t, strings.NewReader("0,1,2\n"), "-log", "-", "-report", path); status != 2 || err == nil {
		t.Errorf("%d, %v", status, err)
	}
	again, err := os.ReadFile(path)
	if err != nil || !bytes.Equal(again, data) || len(only(t, dir)) != 1 {
		t.Errorf("%v, %v", err, only(t, dir))
	}
	for _, path := range []string{filepath.Join(dir, "none", "report.txt"), dir} {
		if status, out, _, err := press(t, nil, "-report", path); status != 2 || out != "" || err == nil || !strings.Contains(err.Error(), "can't write") {
			t.Errorf("%s: %d, %v", path, status, err)
		}
	}
}

// Interrupted, even while it waits for more of the log, it leaves nothing.
func TestInterrupt(t *testing.T) {
	dir := t.TempDir()
	log, w := io.Pipe()
	defer w.Close()
	ctx, cancel := context.WithCancel(t.Context())
	data := goodLog(t)
	go func() {
		w.Write(data[:len(data)/2])
		cancel()
	}()
	var out bytes.Buffer
	type end struct {
		status int
		err    error
	}
	done := make(chan end)
	go func() {
		status, err := run(ctx, []string{"-log", "-", "-report", filepath.Join(dir, "report.txt")}, log, &out, io.Discard)
		done <- end{status, err}
	}()
	select {
	case e := <-done:
		if e.status != 2 || !errors.Is(e.err, errInterrupted) || out.Len() > 0 || len(only(t, dir)) > 0 {
			t.Errorf("%+v, %q, %v", e, out.String(), only(t, dir))
		}
	case <-time.After(30 * time.Second):
		t.Fatal("it goes on")
	}
}

// A full disk is told.
func TestWriteError(t *testing.T) {
	if status, err := run(t.Context(), nil, nil, full{}, io.Discard); status != 2 || !errors.Is(err, errFull) {
		t.Errorf("%d, %v", status, err)
	}
}

type full struct{}

var errFull = errors.New("no space left")

func (full) Write([]byte) (int, error) { return 0, errFull }
