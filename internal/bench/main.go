// Command bench times the library beside what a good engineer would write
// instead, and prints ratios: the same work, in one run, in turns.
//
//	go run ./internal/bench            closed forms by hand in C
//	go run ./internal/bench -general   also a general nonlinear solver, where its headers are installed
//
// The peers stand in the folder peers: closed.c has position, velocity and
// acceleration by hand, in the style of a textbook (an angle for each link) and
// with vectors; lever.c has the slotted lever; kin.c poses the closure equations
// to the nonlinear solver of SUNDIALS. cases.json has the geometry and the sweep,
// ref.json results to 50 digits, made by verify.py: first every peer and the
// library are held against those, then against the clock. Without a C compiler
// the library runs alone. Last comes a group of higher class, beside the same
// linkage driven so that it is solved dyad by dyad.
package main

import (
	"flag"
	"fmt"
	"os"
	"time"
)

func main() {
	rounds := flag.Int("rounds", 15, "rounds; the least time of each case counts, since noise only adds")
	general := flag.Bool("general", false, "also time the general nonlinear solver")
	slice := flag.Duration("slice", 30*time.Millisecond, "time spent on each case in a round")
	flag.Parse()
	if err := run(*rounds, *general, *slice); err != nil {
		fmt.Fprintln(os.Stderr, "bench:", err)
		os.Exit(1)
	}
}

func run(rounds int, general bool, slice time.Duration) error {
	set, err := readCases()
	if err != nil {
		return err
	}
	peers, done, err := buildPeers(set, general, slice)
	if err != nil {
		return err
	}
	defer done()
	ours, err := subjects(set)
	if err != nil {
		return err
	}
	group, err := newGroupTime(set)
	if err != nil {
		return err
	}
	var all []result
	for range rounds {
		for _, p := range peers {
			r, err := p.run()
			if err != nil {
				return err
			}
			all = append(all, r...)
		}
		for _, c := range ours {
			r, err := c.time(slice)
			if err != nil {
				return err
			}
			all = append(all, r)
		}
		if err := group.time(slice); err != nil {
			return err
		}
	}
	if err := report(os.Stdout, set, all); err != nil {
		return err
	}
	group.report(os.Stdout)
	return nil
}
