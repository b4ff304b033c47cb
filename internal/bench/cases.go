package main

import (
	"embed"
	"encoding/json"
	"fmt"
	"maps"
	"math"
	"os"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
)

//go:embed peers
var files embed.FS

// A sweep is the motion of the input: step k of n.
type sweep struct {
	Steps int
	Check []int
}

func (s sweep) input(k int) (phi, omega, alpha float64) {
	return 2 * math.Pi * float64(k) / float64(s.Steps), float64(10 + k%7), float64(-3 + k%11)
}

type slider struct {
	sweep
	R, L, E float64
}

type lever struct {
	sweep
	R, C, E float64
}

// bar is a four-bar, with a second dyad for the six-bars.
type bar struct {
	sweep
	A, B, C float64
	O4      [2]float64
	Branch  float64
	P       [2]float64
	// six-bars
	Base    string
	Q, O6   [2]float64
	B2, C2  float64
	Branch2 float64
	body
}

// body is the same linkage for solvers that take an x, y and angle for each body.
type body struct {
	Pins [][6]float64
	Out  [3]float64
	Q0   []float64
	Th0  []float64
}

type loop struct {
	O       [2]float64
	Off     float64
	A, B, C float64
	Branch  float64
}

type chain struct {
	sweep
	Loops []loop
	Pins  [][6]float64
	Q0    []float64
}

type cases struct {
	Slider slider `json:"slider_crank"`
	Lever  lever
	Four   bar `json:"four_bar"`
	Watt   bar `json:"sixbar_watt"`
	Steph  bar `json:"sixbar_steph"`
	Chain  chain

	reference map[string]map[string][8]float64
}

// chains are the lengths of the chains, in loops.
var chains = []int{1, 3, 10, 30, 100, 330}

func readCases() (*cases, error) {
	set := new(cases)
	for name, to := range map[string]any{"cases.json": set, "ref.json": &set.reference} {
		data, err := files.ReadFile("peers/" + name)
		if err != nil {
			return nil, err
		}
		if err := json.Unmarshal(data, to); err != nil {
			return nil, fmt.Errorf("%s: %w", name, err)
		}
	}
	return set, nil
}

// names of the cases, in the order of the report.
func (s *cases) names() []string {
	n := []string{"slider_crank", "lever", "four_bar", "sixbar_watt", "sixbar_steph"}
	for _, c := range chains {
		n = append(n, "chain"+strconv.Itoa(c))
	}
	return n
}

// writeFlat writes the numbers as plain text, which the C peers read.
func (s *cases) writeFlat(dir string) error {
	flat := map[string][]any{
		"slider_crank": {head(s.Slider.sweep), s.Slider.R, s.Slider.L, s.Slider.E},
		"four_bar":     {head(s.Four.sweep), s.Four.dyad(), s.Four.P},
	}
	for name, m := range map[string]*bar{"sixbar_watt": &s.Watt, "sixbar_steph": &s.Steph} {
		base := 0
		if m.Base == "follower" {
			base = 1
		}
		flat[name] = []any{head(m.sweep), m.dyad(), base, m.Q, m.B2, m.C2, m.O6, m.Branch2, m.Th0}
		flat[name+".body"] = []any{head(m.sweep), len(m.Q0) / 3, len(m.Pins), m.Pins, m.Out, m.Q0}
	}
	for _, n := range chains {
		name, loops := "chain"+strconv.Itoa(n), s.Chain.Loops[:n]
		rows := []any{head(s.Chain.sweep), n}
		for _, l := range loops {
			rows = append(rows, l.Off, l.A, l.B, l.C, l.O, l.Branch)
		}
		flat[name] = rows
		out := []any{2*n + 1, loops[n-1].C / 2, 0}
		flat[name+".body"] = []any{head(s.Chain.sweep), 2*n + 1, 3*n + 1, s.Chain.Pins[:3*n+1], out, s.Chain.Q0[:6*n+3]}
	}
	if err := os.MkdirAll(filepath.Join(dir, "flat"), 0o755); err != nil {
		return err
	}
	for _, name := range slices.Sorted(maps.Keys(flat)) {
		text := plain(fmt.Sprint(flat[name]))
		if err := os.WriteFile(filepath.Join(dir, "flat", name+".txt"), []byte(text), 0o644); err != nil {
			return err
		}
	}
	return nil
}

// plain leaves the numbers of a printed value, with blanks between. Go prints a
// float64 with the fewest digits that read back as the same value.
func plain(s string) string { return strings.NewReplacer("[", " ", "]", " ").Replace(s) + "\n" }

func head(s sweep) []any { return []any{s.Steps, len(s.Check), s.Check} }

func (m *bar) dyad() []any { return []any{m.A, m.B, m.C, m.O4, m.Branch} }
