package rolling_test

import (
	"math"
	"strings"
	"testing"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rolling"
)

// TestNewTrainErrors: each error names the member.
func TestNewTrainErrors(t *testing.T) {
	members := []string{"frame", "sun", "planet", "ring", "carrier"}
	stage := rolling.Planetary{Sun: 24, Planet: 18, Ring: 60}.Meshes(1, 2, 3, 4)
	drives := func(m ...rolling.Member) []rolling.Member { return m }
	for _, row := range []struct {
		name   string
		d      rolling.TrainDesign
		member string
		cause  error
		says   string
	}{
		{"one drive missing", rolling.TrainDesign{Members: members, Meshes: stage, Drives: drives(1)}, "carrier", rigid.ErrInput, "missing"},
		{"one drive too many", rolling.TrainDesign{Members: members, Meshes: stage, Drives: drives(1, 3, 4)}, "carrier", rigid.ErrInput, "too many"},
		{"both of a pair driven", rolling.TrainDesign{Members: []string{"frame", "a", "b"}, Drives: drives(1, 2), Meshes: []rolling.Mesh{mesh(1, 2, 0, 20, 30)}}, "b", rigid.ErrInput, "too many"},
		{"a member in no mesh", rolling.TrainDesign{Members: append(members[:5:5], "idler"), Meshes: stage, Drives: drives(1, 4)}, "idler", rigid.ErrInput, "missing"},
		{"locked: sun and ring fixed", rolling.TrainDesign{Members: []string{"frame", "planet", "carrier"}, Drives: drives(2),
			Meshes: rolling.Planetary{Sun: 24, Planet: 18, Ring: 60}.Meshes(0, 1, 0, 2)}, "carrier", rigid.ErrInput, "locked"},
		{"locked: three wheels in a ring", rolling.TrainDesign{Members: []string{"frame", "a", "b", "c"}, Drives: drives(1),
			Meshes: []rolling.Mesh{mesh(1, 2, 0, 20, 20), mesh(2, 3, 0, 20, 20), mesh(3, 1, 0, 20, 20)}}, "a", rigid.ErrInput, "locked"},
		{"locked beside the drive", rolling.TrainDesign{Members: []string{"frame", "a", "b", "c", "motor"}, Drives: drives(4),
			Meshes: []rolling.Mesh{mesh(1, 2, 0, 20, 20), mesh(2, 3, 0, 20, 20), mesh(3, 1, 0, 20, 20)}}, "b", rigid.ErrInput, "locked"},
		{"no teeth", rolling.TrainDesign{Members: members, Meshes: []rolling.Mesh{mesh(1, 2, 4, 0, 18)}}, "sun", rigid.ErrNotPositive, ""},
		{"negative teeth", rolling.TrainDesign{Members: members, Meshes: []rolling.Mesh{mesh(1, 2, 4, 20, -18)}}, "planet", rigid.ErrNotPositive, ""},
		{"meshes with itself", rolling.TrainDesign{Members: members, Meshes: []rolling.Mesh{mesh(2, 2, 4, 20, 18)}}, "planet", rigid.ErrInput, "itself"},
		{"its own arm", rolling.TrainDesign{Members: members, Meshes: []rolling.Mesh{mesh(1, 4, 4, 20, 18)}}, "carrier", rigid.ErrInput, "itself"},
		{"driven twice", rolling.TrainDesign{Members: members, Meshes: stage, Drives: drives(1, 1)}, "sun", rigid.ErrInput, "twice"},
		{"one name twice", rolling.TrainDesign{Members: []string{"frame", "sun", "sun"}}, "sun", rigid.ErrInput, "twice"},
		{"frame driven", rolling.TrainDesign{Members: members, Meshes: stage, Drives: drives(1, 0)}, "Drives[1]", rigid.ErrInput, ""},
		{"drive of no member", rolling.TrainDesign{Members: members, Meshes: stage, Drives: drives(7)}, "Drives[0]", rigid.ErrInput, ""},
		{"mesh of no member", rolling.TrainDesign{Members: members, Meshes: []rolling.Mesh{mesh(1, -1, 4, 20, 18)}}, "Meshes[0].B", rigid.ErrInput, ""},
		{"arm of no member", rolling.TrainDesign{Members: members, Meshes: []rolling.Mesh{mesh(1, 2, 5, 20, 18)}}, "Meshes[0].Arm", rigid.ErrInput, ""},
		{"no name", rolling.TrainDesign{Members: []string{"", ""}}, "Members[1]", rigid.ErrInput, "missing"},
		{"nothing", rolling.TrainDesign{}, "Members", rigid.ErrInput, ""},
		{"overflow", tower(40), "gear 34", rigid.ErrNotFinite, ""},
	} {
		tr, err := rolling.NewTrain(row.d)
		if err == nil {
			t.Errorf("%s: no error", row.name)
			continue
		}
		checkRefused(t, tr == nil, err, row.member, row.cause)
		if !strings.Contains(err.Error(), row.says) {
			t.Errorf("%s: message %q does not say %q", row.name, err, row.says)
		}
	}
}

// tower returns n pairs of gears in a row, each a billion to one.
func tower(n int) rolling.TrainDesign {
	var d rolling.TrainDesign
	last := d.Member("motor")
	d.Drives = []rolling.Member{last}
	for i := range n {
		next := d.Member("gear " + string(rune('0'+i/10)) + string(rune('0'+i%10)))
		d.Meshes = append(d.Meshes, mesh(last, next, 0, 1e9, 1))
		last = next
	}
	return d
}

func TestTrainSolveRefuses(t *testing.T) {
	tr := train(t, coupledAnnuli())
	in := rigid.Coordinate{Pos: 1}
	full := make([]rigid.Coordinate, 7)
	full[3].Pos = 42
	nan, inf := math.NaN(), math.Inf(1)
	for name, row := range map[string]struct {
		tr   *rolling.Train
		dst  []rigid.Coordinate
		in   []rigid.Coordinate
		want error
	}{
		"short dst":    {tr, full[:6], []rigid.Coordinate{in, in}, rigid.ErrInput},
		"no dst":       {tr, nil, []rigid.Coordinate{in, in}, rigid.ErrInput},
		"one input":    {tr, full, []rigid.Coordinate{in}, rigid.ErrInput},
		"three inputs": {tr, full, []rigid.Coordinate{in, in, in}, rigid.ErrInput},
		"zero Train":   {&rolling.Train{}, nil, nil, rigid.ErrInput},
		"NaN place":    {tr, full, []rigid.Coordinate{in, {Pos: nan}}, rigid.ErrNotFinite},
		"infinite":     {tr, full, []rigid.Coordinate{{Vel: inf}, in}, rigid.ErrNotFinite},
		"NaN rate":     {tr, full, []rigid.Coordinate{{Acc: nan}, in}, rigid.ErrNotFinite},
		"overflow":     {tr, full, []rigid.Coordinate{{Acc: 1.7e308}, {Acc: 1.7e308}}, rigid.ErrNotFinite},
	} {
		if err := row.tr.Solve(row.dst, row.in...); err != row.want || full[3].Pos != 42 || full[4].Pos != 0 {
			t.Errorf("%s: %v, want %v; %+v", name, err, row.want, full)
		}
	}
	if d := (&rolling.Train{}).Design(); d.Members != nil || d.Meshes != nil || d.Drives != nil {
		t.Errorf("a zero Train has a design: %+v", d)
	}
}
