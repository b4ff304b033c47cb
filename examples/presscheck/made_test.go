package main

import (
	"bufio"
	"fmt"
	"io"
	"math"
	"math/rand/v2"

	"example.com/twopoint/rigid"
)

// A made is a log of an invented press, made by the triangle of crank, rod and guide
// and not by the library.
type made struct {
	lines              int
	crank, rod, offset float64                      // m
	speed, step        float64                      // of the crank, rad/s; mean time between lines, s
	start              float64                      // crank angle, rad
	park               float64                      // s at rest before
	gap                rigid.Interval               // s without lines
	zero               int64                        // of the encoder, 4096 a turn, 5 turns to one of the crank
	reverse            bool                         // counts
	scale              float64                      // m, offset of the ram scale
	noise              float64                      // m
	slip               func(turned float64) float64 // by which the crank is behind, rad
	lost               func(t float64) int64        // counts
	spoil              func(k int, ram float64) float64
	seed               uint64
}

func good(seed uint64) made {
	return made{lines: 2000, crank: 0.120, rod: 0.480, offset: 0.015, speed: 2.5, step: 0.008, start: 0.4, zero: 6000, scale: -2e-3, noise: 2e-5, seed: seed}
}

// write writes the log; nothing of it is kept.
func (m made) write(w io.Writer) error {
	b := bufio.NewWriter(w)
	rnd := rand.New(rand.NewPCG(m.seed, 9))
	fmt.Fprintln(b, "time_s,motor_counts,ram_m")
	const runUp = 0.8
	for t, k := 0.0, 0; k < m.lines; k++ {
		going := max(t-m.park, 0)
		turned := m.speed * (going - runUp/2)
		if s := going / runUp; s < 1 {
			turned = m.speed * runUp * (s*s*s - s*s*s*s/2)
		}
		motor, turn := m.start+turned, m.start+turned
		if m.slip != nil {
			turn -= m.slip(turned)
		}
		y := m.offset - m.crank*math.Sin(turn)
		ram := m.crank*math.Cos(turn) + math.Sqrt(m.rod*m.rod-y*y) + m.scale + m.noise*rnd.NormFloat64()
		if m.spoil != nil {
			ram = m.spoil(k, ram)
		}
		counts := int64(math.Floor(motor * 5 * 4096 / (2 * math.Pi)))
		if m.lost != nil {
			counts -= m.lost(t)
		}
		if m.reverse {
			counts = -counts
		}
		if t > m.gap.Lo && t < m.gap.Hi {
			t += m.step
			continue
		}
		if _, err := fmt.Fprintf(b, "%.4f,%d,%.5f\n", t, m.zero+counts, ram); err != nil {
			return err
		}
		t += m.step * (0.8 + 0.4*rnd.Float64())
	}
	return b.Flush()
}

// reader gives the log as it is read.
func (m made) reader() io.Reader {
	r, w := io.Pipe()
	go func() { w.CloseWithError(m.write(w)) }()
	return r
}
