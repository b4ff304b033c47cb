package main

import (
	"bytes"
	"encoding/json"
	"errors"
	"flag"
	"fmt"
	"io"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"example.com/twopoint/examples/internal/presslog"
)

func press(t *testing.T, stdin string, args ...string) (stdout, stderr string, err error) {
	t.Helper()
	var out, errs bytes.Buffer
	err = run(args, strings.NewReader(stdin), &out, &errs)
	return out.String(), errs.String(), err
}

func file(t *testing.T, name, text string) string {
	t.Helper()
	path := filepath.Join(t.TempDir(), name)
	if err := os.WriteFile(path, []byte(text), 0o644); err != nil {
		t.Fatal(err)
	}
	return path
}

// line is one line of -json, of any kind.
type line struct {
	Tick           *tick
	NearDeadCentre *place
	Summary        *summary
}

func jsonLines(t *testing.T, out string) (all []line) {
	t.Helper()
	for dec := json.NewDecoder(strings.NewReader(out)); ; {
		var l line
		switch err := dec.Decode(&l); err {
		case nil:
			all = append(all, l)
		case io.EOF:
			return all
		default:
			t.Fatal(err)
		}
	}
}

func TestSample(t *testing.T) {
	out, errs, err := press(t, "", "-json")
	if err != nil {
		t.Fatal(err)
	}
	all := jsonLines(t, out)
	ticks, places, parked := 0, 0, false
	for _, l := range all {
		switch {
		case l.Tick != nil:
			ticks++
			// the crank speed that gives a ram speed, by the ratio of the two there
			k := l.Tick
			if c := k.Commanded; c.Refused == "" && math.Abs(c.CrankSpeed*k.Ram.Vel-c.RamSpeed*k.Crank.Vel) > 1e-9 {
				t.Errorf("tick %+v", k)
			}
			sum := k.Terms.Sum()
			if sum.X == 0 && k.Crank.Vel != 0 {
				t.Errorf("no acceleration: %+v", k)
			}
		case l.NearDeadCentre != nil:
			places++
			parked = parked || l.NearDeadCentre.From == 0
		}
	}
	last := all[len(all)-1].Summary
	if ticks < 10 || places != 5 || !parked || last == nil {
		t.Fatalf("%d ticks, %d places, parked %v, summary %+v", ticks, places, parked, last)
	}
	if last.Samples != 1319 || last.Skipped != 2 || last.Places != places {
		t.Errorf("summary %+v", last)
	}
	// The log's machine has a rod 0.3 mm shorter; at the crank angle α the ram is
	// off by 0.3 mm/cos of the rod's angle, at most 0.3/√(1 − (0.135/0.48)²), and the
	// noise of the scale, and half a count.
	if w := last.Worst; math.Abs(w.Difference) < 0.3e-3 || math.Abs(w.Difference) > 0.45e-3 || w.Difference > 0 {
		t.Errorf("worst %+v", w)
	}
	for _, want := range []string{"line 402", "line 779", "O.42064"} {
		if !strings.Contains(errs, want) {
			t.Errorf("%q is not in %q", want, errs)
		}
	}
}

func TestTable(t *testing.T) {
	out, _, err := press(t, "")
	if err != nil {
		t.Fatal(err)
	}
	for _, want := range []string{"an invented machine", "not a safety function", "rod centre", "inner dead centre", "worst difference", "1319 samples, 2 skipped"} {
		if !strings.Contains(out, want) {
			t.Errorf("%q is not in the table:\n%s", want, out)
		}
	}
}

func TestStrictStops(t *testing.T) {
	_, _, err := press(t, "", "-strict")
	var bad *presslog.LineError
	if !errors.As(err, &bad) || bad.Line != 402 {
		t.Errorf("%v, want line 402", err)
	}
}

// Nothing but the spoilt lines is lost, whatever spoils them.
func TestMalformedLines(t *testing.T) {
	log := "\ufefftime_s,crank_counts,ram_m\n" +
		"0.0,5065,0.5995\n" +
		"0.1,5070\n" + // a field short
		"0.2,99999999999999999999,0.5\n" + // beyond int64
		"0.3,-9223372036854775808,0.5\n" + // less Zero beyond int64
		"0.4,\"50\"75,0.5\n" + // a quote inside
		"NaN?,5080,0.5\n" +
		"0.0,5080,0.5\n" + // no later than the first
		"0.5,5085,0.5995\n"
	out, errs, err := press(t, log, "-log", "-", "-json", "-window", "3")
	if err != nil {
		t.Fatal(err)
	}
	all := jsonLines(t, out)
	if s := all[len(all)-1].Summary; s.Samples != 2 || s.Skipped != 6 {
		t.Errorf("summary %+v, said %s", s, errs)
	}
	for n := 3; n <= 8; n++ {
		if !strings.Contains(errs, fmt.Sprintf("line %d:", n)) {
			t.Errorf("line %d is not reported: %s", n, errs)
		}
	}
}

func TestNotFinite(t *testing.T) {
	out, errs, err := press(t, "0,5065,0.5\n0.1,5066,NaN\nInf,5067,0.5\n", "-log", "-", "-json", "-window", "3")
	if err != nil {
		t.Fatal(err)
	}
	all := jsonLines(t, out)
	if s := all[len(all)-1].Summary; s == nil || s.Samples != 1 || s.Skipped != 2 {
		t.Errorf("%s\n%s", out, errs)
	}
}

func TestMachine(t *testing.T) {
	for _, c := range []struct{ why, text, want string }{
		{"an unknown field", `{"press": {"crank": 0.1, "rodd": 0.4}}`, "rodd"},
		{"a wrong dimension", `{"press": {"crank": 0.1, "rod": -0.4}, "encoder": {"perTurn": 100}}`, "Rod"},
		{"no encoder", `{"press": {"crank": 0.1, "rod": 0.4}}`, "encoder.perTurn: 0"},
		{"no inner dead centre", `{"press": {"crank": 0.1, "rod": 0.1, "offset": 0.01}, "encoder": {"perTurn": 100}}`, "two dead centres"},
		{"two values", `{"press": {"crank": 0.1, "rod": 0.4}, "encoder": {"perTurn": 100}} {}`, "more than one"},
		{"no JSON", `crank: 0.1`, "machine.json"},
	} {
		_, _, err := press(t, "", "-machine", file(t, "machine.json", c.text))
		if err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%s: %v, want %q in it", c.why, err, c.want)
		}
	}
	if _, _, err := press(t, "", "-machine", filepath.Join(t.TempDir(), "none.json")); !errors.Is(err, os.ErrNotExist) {
		t.Errorf("no file: %v", err)
	}
}

func TestFlags(t *testing.T) {
	for _, args := range [][]string{{"-every", "0"}, {"-margin", "2"}, {"-window", "1"}, {"-ram-speed", "NaN"}, {"-ram-speed", "-Inf"}, {"log.csv"}, {"-log", "none.csv"}} {
		if _, _, err := press(t, "", args...); err == nil {
			t.Errorf("%v is taken", args)
		}
	}
	_, help, err := press(t, "", "-h")
	if !errors.Is(err, flag.ErrHelp) || !strings.Contains(help, "-ram-speed") {
		t.Errorf("help: %v, %q", err, help)
	}
	if _, _, err := press(t, "", "-log", "-"); err == nil {
		t.Error("an empty log is taken")
	}
}

// A ram speed is refused where the press is parked at a dead centre, and the place
// is answered.
func TestParked(t *testing.T) {
	var log strings.Builder
	for i := range 60 {
		fmt.Fprintf(&log, "%g,5000,0.6\n", 0.01*float64(i))
	}
	machine := file(t, "machine.json", `{"press": {"crank": 0.12, "rod": 0.48}, "encoder": {"perTurn": 16384, "zero": 5000}}`)
	out, _, err := press(t, log.String(), "-log", "-", "-machine", machine, "-json", "-every", "30", "-window", "5")
	if err != nil {
		t.Fatal(err)
	}
	for _, l := range jsonLines(t, out) {
		if k := l.Tick; k != nil && (k.Ram.Pos != 0.6 || k.Ram.Vel != 0 || !strings.Contains(k.Commanded.Refused, "singular")) {
			t.Errorf("%+v", *k)
		}
	}
}

// A full disk is told.
func TestWriteError(t *testing.T) {
	if err := run(nil, nil, full{}, io.Discard); !errors.Is(err, errFull) {
		t.Errorf("%v", err)
	}
}

type full struct{}

var errFull = errors.New("no space left")

func (full) Write([]byte) (int, error) { return 0, errFull }
