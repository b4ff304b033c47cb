package planar_test

import (
	"fmt"
	"testing"

	. "example.com/twopoint/planar"
)

// Decompositions are those of the theory of machines (Assur's groups, as in
// Artobolevskii's textbook, from memory). Mobility is counted by hand, after Grübler
// and Kutzbach: F = 3(n − 1) − 2·(pins and guides) − (slots, meshes).
func TestGroups(t *testing.T) {
	tests := []struct {
		name     string
		design   Design
		mobility int
		want     string
	}{
		{"four-bar, crank", driven(fourBar(), 1, 0), 1, "crank | rod+rocker RRR"},
		{"four-bar, rocker", driven(fourBar(), 3, 0), 1, "rocker | crank+rod RRR"},
		{"four-bar, coupler's angle", driven(fourBar(), 2, 0), 1, "crank+rod+rocker RRR"},
		{"four-bar, at a moving pin", driven(fourBar(), 2, 3), 1, "crank+rod+rocker RRR"},
		{"slider-crank", driven(sliderCrank(), 1, 0), 1, "crank | rod+ram RRP"},
		{"slider-crank, rod's angle", driven(sliderCrank(), 2, 0), 1, "crank+rod+ram RRP"},
		{"Watt I, base", wattI(0), 1, "base | arm+coupler RRR | rocker+link RRR"},
		{"Watt I, arm", wattI(1), 1, "arm | base+coupler RRR | rocker+link RRR"},
		{"Watt I, coupler", wattI(2), 1, "base+arm+coupler RRR | rocker+link RRR"},
		{"Watt I, rocker", wattI(3), 1, "base+arm+coupler+rocker+link 3"},
		{"Watt I, link", wattI(4), 1, "base+arm+coupler+rocker+link 3"},
		{"Watt II, crank", wattII(0), 1, "crank | rod+beam RRR | link+rocker RRR"},
		{"Watt II, rod", wattII(1), 1, "crank+rod+beam RRR | link+rocker RRR"},
		{"Watt II, beam", wattII(2), 1, "beam | crank+rod RRR | link+rocker RRR"},
		{"Watt II, link", wattII(3), 1, "beam+link+rocker RRR | crank+rod RRR"},
		{"Watt II, rocker", wattII(4), 1, "rocker | beam+link RRR | crank+rod RRR"},
		{"Stephenson I, left", stephensonI(0), 1, "left | bar+right RRR | link+tie RRR"},
		{"Stephenson I, bar", stephensonI(1), 1, "left+bar+right RRR | link+tie RRR"},
		{"Stephenson I, right", stephensonI(2), 1, "right | left+bar RRR | link+tie RRR"},
		{"Stephenson I, link", stephensonI(3), 1, "left+bar+right+link+tie 4"},
		{"Stephenson I, tie", stephensonI(4), 1, "left+bar+right+link+tie 4"},
		{"Stephenson II, base", stephensonII(0), 1, "base | one+two+plate+crank 3"},
		{"Stephenson II, one", stephensonII(1), 1, "base+one+two+plate+crank 3"},
		{"Stephenson II, two", stephensonII(2), 1, "base+one+two+plate+crank 3"},
		{"Stephenson II, plate", stephensonII(3), 1, "base+one+two+plate+crank 4"},
		{"Stephenson II, crank", stephensonII(4), 1, "crank | base+one+two+plate 4"},
		{"Stephenson III, crank", stephensonIII(0), 1, "crank | plate+rocker RRR | link+lever RRR"},
		{"Stephenson III, plate", stephensonIII(1), 1, "crank+plate+rocker RRR | link+lever RRR"},
		{"Stephenson III, rocker", stephensonIII(2), 1, "rocker | crank+plate RRR | link+lever RRR"},
		{"Stephenson III, link", stephensonIII(3), 1, "crank+plate+rocker+link+lever 3"},
		{"Stephenson III, lever", stephensonIII(4), 1, "lever | crank+plate+rocker+link 3"},
		{"Peaucellier", peaucellier("QB"), 1, "QB | OA+AB RRR | OC+BC RRR | CD+DA RRR"},
		{"Peaucellier, from the output", peaucellier("DA"), 1, "QB+OA+AB+OC+BC+CD+DA 4"},
		{"scissor lift", scissor(40), 1, scissorGroups(40)},
		{"quick return with ram", quickReturn(), 1, "crank | lever RPR | link+ram RRP"},
		{"wedge", wedge(false), 1, "wedge | lifter"},
		{"wedge that drives a crank", wedge(true), 1, "wedge | lifter | rod+crank RRR"},
		{"wedge on a carrier", wedgeOnCarrier(), 2, "carrier | wedge | lifter"},
		{"Oldham coupling", oldham(), 1, "shaft | disc+output RPP"},
		{"trammel, rod driven", trammel(true, false), 1, "rod+along+across"},
		{"trammel with pins in slots", trammel(false, false), 1, "rod"},
		{"trammel, block driven", trammel(true, true), 1, "along | rod+across RRP"},
		{"Scotch yoke", scotchYoke(), 1, "crank | block+yoke RPP"},
		{"five-bar, two drives", fiveBar("driven"), 2, "left | right | one+two RRR"},
		{"five-bar, geared", fiveBar("geared"), 1, "left | right | one+two RRR"},
		{"five-bar, gears on the coupler", fiveBar("coupler"), 1, "left | right+one+two 3"},
		{"rack and slider-crank", rackPress(), 1, "pinion | rack | rod+crank RRR"},
		{"digger", digger(false), 2, "boom RRR | bucket RRR"},
		{"digger with its cylinders", digger(true), 2, "boom+barrel0+piston0 RRR | bucket+barrel1+piston1 RRR"},
		{"x-y stage", xyStage(), 2, "carriage | table"},
		{"epicyclic", epicyclic(1, false), 1, "arm | planet0 | sun"},
		{"epicyclic, third planet", epicyclic(3, true), 1, "arm | planet0 | sun | planet1 | planet2"},
	}
	for _, test := range tests {
		t.Run(test.name, func(t *testing.T) {
			l, err := New(test.design)
			if err != nil {
				t.Fatal(err)
			}
			if got := groups(l); got != test.want {
				t.Errorf("groups\n got %s\nwant %s", got, test.want)
			}
			if got := l.Mobility(); got != test.mobility {
				t.Errorf("mobility %d, want %d", got, test.mobility)
			}
		})
	}
}

// Blocks are as small as can be: driving links, wheels and planets take no
// equations to be solved together, nor does a pinion turned by its rack.
func TestBlocks(t *testing.T) {
	rack := rackPress()
	rack.Drives[0] = Slide{Of: Link(2).Line(0, 0, 0), From: Frame.Line(0, 0, 0)}
	for _, test := range []struct {
		name   string
		design Design
		want   string
	}{
		{"four-bar", driven(fourBar(), 1, 0), "[1 1 6]"},
		{"slider-crank", driven(sliderCrank(), 1, 0), "[1 1 5]"},
		{"epicyclic", epicyclic(3, true), "[1 1 1 1 1 1 1 1 1 1]"},
		{"rack that drives its pinion", rack, "[1 1 2 1 6]"},
	} {
		l, err := New(test.design)
		if err != nil {
			t.Fatal(err)
		}
		if got := fmt.Sprint(Sizes(l)); got != test.want {
			t.Errorf("%s: blocks of %s, want %s", test.name, got, test.want)
		}
	}
}
