package slidercrank_test

import (
	"encoding/csv"
	"math"
	"os"
	"path/filepath"
	"strconv"
	"testing"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

const eps = 0x1p-52

// A row of a table made with 50 digits by testdata/inversions.py: the dimensions,
// the drive, which of two positions is meant (0 where there is one), and each
// output with the sum K of |y| and all |x ∂y/∂x|.
type row struct {
	dims  []float64
	drive rigid.Coordinate
	pick  float64
	want  []rigid.Coordinate
	unit  []rigid.Coordinate
}

// side returns the knee that the row means.
func (r row) side() rigid.Side {
	if r.pick < 0 {
		return rigid.Left
	}
	return rigid.Right
}

// table reads testdata/inversions_<name>.csv, whose rows start with n dimensions.
func table(t *testing.T, name string, n int) []row {
	t.Helper()
	return readTable(t, "inversions_"+name, n)
}

// readTable reads testdata/<name>.csv, whose rows start with n dimensions.
func readTable(t *testing.T, name string, n int) []row {
	t.Helper()
	f, err := os.Open(filepath.Join("testdata", name+".csv"))
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	records, err := csv.NewReader(f).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	var rows []row
	for _, record := range records[1:] {
		x := make([]float64, len(record))
		for i, field := range record {
			if x[i], err = strconv.ParseFloat(field, 64); err != nil {
				t.Fatal(err)
			}
		}
		r := row{dims: x[:n], drive: rigid.Coordinate{Pos: x[n], Vel: x[n+1], Acc: x[n+2]}, pick: x[n+3]}
		for y := x[n+4:]; len(y) > 0; y = y[6:] {
			r.want = append(r.want, rigid.Coordinate{Pos: y[0], Vel: y[2], Acc: y[4]})
			r.unit = append(r.unit, rigid.Coordinate{Pos: y[1], Vel: y[3], Acc: y[5]})
		}
		rows = append(rows, r)
	}
	if len(rows) < 100 {
		t.Fatalf("%s: only %d rows", name, len(rows))
	}
	return rows
}

// compare checks the outputs of every row of a table within bound × ε × K and logs
// how near to it they come.
func compare(t *testing.T, name string, n int, bound float64, solve func(r row) ([]rigid.Coordinate, error)) {
	t.Helper()
	compareRows(t, table(t, name, n), bound, solve)
}

// compareRows is compare for the rows of any table.
func compareRows(t *testing.T, rows []row, bound float64, solve func(r row) ([]rigid.Coordinate, error)) {
	t.Helper()
	var worst rigid.Coordinate
	for i, r := range rows {
		got, err := solve(r)
		if err != nil {
			t.Errorf("row %d: %v: %v", i, r.dims, err)
			continue
		}
		if len(got) != len(r.want) {
			t.Fatalf("row %d: %d outputs, want %d", i, len(got), len(r.want))
		}
		for j, y := range got {
			off := rigid.Coordinate{
				Pos: math.Abs(y.Pos-r.want[j].Pos) / r.unit[j].Pos / eps,
				Vel: math.Abs(y.Vel-r.want[j].Vel) / r.unit[j].Vel / eps,
				Acc: math.Abs(y.Acc-r.want[j].Acc) / r.unit[j].Acc / eps,
			}
			if r.unit[j].Vel == 0 {
				off.Vel = math.Abs(y.Vel)
			}
			if r.unit[j].Acc == 0 {
				off.Acc = math.Abs(y.Acc)
			}
			if !(off.Pos <= bound && off.Vel <= bound && off.Acc <= bound) {
				t.Errorf("row %d output %d: %v driven by %+v:\ngot  %+v\nwant %+v\noff by %+v ε·K", i, j, r.dims, r.drive, y, r.want[j], off)
			}
			worst = rigid.Coordinate{Pos: max(worst.Pos, off.Pos), Vel: max(worst.Vel, off.Vel), Acc: max(worst.Acc, off.Acc)}
		}
	}
	t.Logf("worst, in ε·K: %.3f %.3f %.3f", worst.Pos, worst.Vel, worst.Acc)
}

// lever returns the slotted lever of a row.
func lever(t *testing.T, r row) *slidercrank.SlottedLever {
	t.Helper()
	l, err := slidercrank.NewSlottedLever(slidercrank.LeverDimensions{Crank: r.dims[0], Centre: r.dims[1], Slot: r.dims[2]})
	if err != nil {
		t.Fatal(err)
	}
	return l
}

func TestSlottedLeverTable(t *testing.T) {
	var st slidercrank.LeverState
	compare(t, "turn", 3, 4, func(r row) ([]rigid.Coordinate, error) {
		err := lever(t, r).Solve(&st, r.drive)
		return []rigid.Coordinate{st.Swing, st.Slide}, err
	})
}

func TestSlottedLeverSwingTable(t *testing.T) {
	var st slidercrank.LeverState
	compare(t, "swing", 3, 4, func(r row) ([]rigid.Coordinate, error) {
		err := lever(t, r).SolveSwing(&st, r.drive, r.side())
		return []rigid.Coordinate{st.Turn, st.Slide}, err
	})
}
