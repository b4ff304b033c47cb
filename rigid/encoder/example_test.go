package encoder_test

import (
	"fmt"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rigid/encoder"
)

// The crank of an invented roof-tile press has an encoder of 4096 counts a turn,
// which stands at 512 when the ram is up.
func ExampleEncoder() {
	crank := encoder.Encoder{PerTurn: 4096, Zero: 512}
	turns, angle, err := crank.Angle(512 + 7_000_000*4096 + 1024)
	fmt.Printf("%d turns and %.0f°, %v\n", turns, angle/rigid.Degree, err)
	count, err := crank.Count(-1, 270*rigid.Degree)
	fmt.Println(count, err)
	// Output:
	// 7000000 turns and 90°, <nil>
	// -512 <nil>
}

// The ram's scale is read about every millisecond; its speed is wanted now.
func ExampleRates() {
	ram, err := encoder.NewRates(5, 2)
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, now := range []float64{0, 0.0010, 0.0021, 0.0030, 0.0041} {
		place := 0.2 - 0.5*now + 6*now*now
		if c, at, ok := ram.Add(now, place); ok {
			c = c.After(now - at)
			fmt.Printf("%.5f m, %.4f m/s, %.1f m/s²\n", c.Pos, c.Vel, c.Acc)
		}
	}
	// Output: 0.19805 m, -0.4508 m/s, 12.0 m/s²
}
