package main

import (
	"fmt"
	"io"
	"math"
	"slices"
	"strconv"
	"text/tabwriter"
)

// library is what a result of ours names as its peer.
const library = "twopoint"

// report holds every result against the reference, then prints the least time of
// each peer over the rounds of one run, and the library's ratio to it.
func report(w io.Writer, set *cases, all []result) error {
	ns := map[[2]string][]float64{}
	var order [][2]string
	for _, r := range all {
		if err := set.check(r); err != nil {
			return err
		}
		key := [2]string{r.Case, r.Peer}
		if ns[key] == nil {
			order = append(order, key)
		}
		ns[key] = append(ns[key], r.Ns)
	}
	t := tabwriter.NewWriter(w, 0, 0, 2, ' ', 0)
	fmt.Fprintln(t, "case\tpeer\tns a step\ttwopoint\tratio twopoint : peer\t")
	for _, c := range set.names() {
		if len(ns[[2]string{c, library}]) == 0 {
			continue
		}
		ours := slices.Min(ns[[2]string{c, library}])
		for _, key := range order {
			if key[0] != c {
				continue
			}
			m := slices.Min(ns[key])
			if key[1] != library {
				fmt.Fprintf(t, "%s\t%s\t%.1f\t%.1f\t%.3g\t\n", c, key[1], m, ours, ours/m)
			} else if alone(order, c) {
				fmt.Fprintf(t, "%s\t(alone)\t\t%.1f\t\t\n", c, m)
			}
		}
	}
	if err := t.Flush(); err != nil {
		return err
	}
	reportExponent(w, ns)
	return nil
}

// alone reports whether the library has no peer in a case.
func alone(order [][2]string, c string) bool {
	return !slices.ContainsFunc(order, func(k [2]string) bool { return k[0] == c && k[1] != library })
}

// reportExponent prints p of time ~ loops^p from 10 loops up, by least squares on
// the logarithms.
func reportExponent(w io.Writer, ns map[[2]string][]float64) {
	var x, y []float64
	for _, n := range chains {
		if v := ns[[2]string{"chain" + strconv.Itoa(n), library}]; n >= 10 && len(v) > 0 {
			x, y = append(x, math.Log(float64(n))), append(y, math.Log(slices.Min(v)))
		}
	}
	if len(x) < 2 {
		return
	}
	mx, my, xy, xx := mean(x), mean(y), 0.0, 0.0
	for i := range x {
		xy += (x[i] - mx) * (y[i] - my)
		xx += (x[i] - mx) * (x[i] - mx)
	}
	fmt.Fprintf(w, "time of a chain ~ loops^%.2f from 10 loops up\n", xy/xx)
}

// check holds a result against the 50-digit reference: 1e-9 of the larger of 1 and
// the value is what tells the same work from other work.
func (s *cases) check(r result) error {
	if len(r.Check) == 0 {
		return fmt.Errorf("%s: %s: nothing to check", r.Case, r.Peer)
	}
	for step, got := range r.Check {
		want, ok := s.reference[r.Case][step]
		if !ok {
			return fmt.Errorf("%s: no reference for step %s", r.Case, step)
		}
		for i := range got {
			if !(math.Abs(got[i]-want[i]) <= 1e-9*max(1, math.Abs(want[i]))) {
				return fmt.Errorf("%s: %s: step %s, output %d: %v, want %v", r.Case, r.Peer, step, i, got[i], want[i])
			}
		}
	}
	return nil
}

func mean(x []float64) float64 {
	s := 0.0
	for _, v := range x {
		s += v
	}
	return s / float64(len(x))
}
