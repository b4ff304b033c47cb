package main

import (
	"bufio"
	"encoding/json"
	"fmt"
	"io"
	"math"
	"strings"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// A printer shows what a run finds, as it finds it.
type printer interface {
	tick(tick)
	place(place)
	summary(summary)
	flush() error
}

func newPrinter(o options, w io.Writer) printer {
	b := bufio.NewWriter(w)
	if o.json {
		return &lines{b, json.NewEncoder(b)}
	}
	t := &table{Writer: b, options: o}
	t.head()
	return t
}

// lines prints JSON lines: an object with one key, what it is, for each.
type lines struct {
	*bufio.Writer
	enc *json.Encoder
}

func (l *lines) tick(t tick)       { l.enc.Encode(map[string]tick{"tick": t}) }
func (l *lines) place(p place)     { l.enc.Encode(map[string]place{"nearDeadCentre": p}) }
func (l *lines) summary(s summary) { l.enc.Encode(map[string]summary{"summary": s}) }
func (l *lines) flush() error      { return l.Flush() }

// table prints text for people. A bufio.Writer keeps the first error until Flush.
type table struct {
	*bufio.Writer
	options
}

const layout = "%8s %8s %8s %9s %9s %10s   %7s %7s %7s %7s   %s\n"

func (t *table) head() {
	fmt.Fprintln(t, "Roof-tile press, an invented machine. Ideal kinematics, not a safety function.")
	fmt.Fprintf(t, "\n%58s   %-31s   %s\n", "", "rod centre, m/s²", "crank speed for")
	fmt.Fprintf(t, layout, "time", "crank", "speed", "ram", "ram speed", "ram acc.", "base", "tang.", "normal", "sum", fmt.Sprintf("ram at %g m/s", t.ramSpeed))
	fmt.Fprintf(t, layout, "s", "deg", "rpm", "mm", "m/s", "m/s²", "", "", "", "", "rpm")
}

func (t *table) tick(k tick) {
	back := k.Commanded.Refused
	if back == "" {
		back = fmt.Sprintf("%.2f", k.Commanded.CrankSpeed/rigid.RPM)
	}
	fmt.Fprintf(t, layout, num(k.Time, 3), num(k.Crank.Pos/rigid.Degree, 2), num(k.Crank.Vel/rigid.RPM, 2),
		num(k.Ram.Pos/rigid.Millimetre, 3), num(k.Ram.Vel, 4), num(k.Ram.Acc, 3),
		size(k.Terms.Base), size(k.Terms.Tangential), size(k.Terms.Normal), size(k.Terms.Sum()),
		strings.TrimPrefix(back, "twopoint: "))
}

func (t *table) place(p place) {
	fmt.Fprintf(t, "%8s to %s s: within margin %g of the %s dead centre, least %.4f at %.2f deg\n",
		num(p.From, 3), num(p.To, 3), t.margin, p.Which, p.Least, p.Crank/rigid.Degree)
}

func (t *table) summary(s summary) {
	w := s.Worst
	fmt.Fprintf(t, "\n%d samples, %d skipped, %d places within margin %g of a dead centre\n", s.Samples, s.Skipped, s.Places, t.margin)
	fmt.Fprintf(t, "worst difference of the measured ram: %+.3f mm at %.3f s, crank %.2f deg: %.3f mm measured, %.3f mm ideal\n",
		w.Difference/rigid.Millimetre, w.Time, w.Crank/rigid.Degree, w.Measured/rigid.Millimetre, w.Ideal/rigid.Millimetre)
}

func (t *table) flush() error { return t.Flush() }

func num(x float64, digits int) string { return fmt.Sprintf("%.*f", digits, x) }

func size(v r2.Vec) string { return num(math.Hypot(v.X, v.Y), 3) }
