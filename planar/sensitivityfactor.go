package planar

import (
	"math"

	"example.com/twopoint/rigid"
)

// A skyline is a matrix of rows × n, rows ≥ n, and its factors. Rows that lie low
// to the left and reach no farther than they must stay short, so that where groups
// are solved one after another the time grows with the number of groups and the size of each.
type skyline struct {
	n           int
	a           []float64 // row by row: multipliers, then what is left
	first, last []int     // columns of each row that are not zero, at most
	order       []int     // of the rows as pivots; the rest repeat others
	most        []float64 // of every column
}

func newSkyline(rows, n int) skyline {
	return skyline{n, make([]float64, rows*n), make([]int, rows), make([]int, rows), make([]int, rows), make([]float64, n)}
}

func (m *skyline) clear() {
	clear(m.a)
	clear(m.most)
	for i := range m.order {
		m.order[i], m.first[i], m.last[i] = i, m.n, -1
	}
}

func (m *skyline) add(row, column int, v float64) {
	if v == 0 {
		return
	}
	m.a[row*m.n+column] += v
	m.first[row], m.last[row] = min(m.first[row], column), max(m.last[row], column)
	m.most[column] = math.Max(m.most[column], math.Abs(v))
}

// factor eliminates column by column; of the pivots within a tenth of the largest
// it takes the shortest row. It reports whether the columns are independent.
func (m *skyline) factor() bool {
	const zero = rigid.LeastMargin / 100
	n := m.n
	for k := range n {
		p := m.pivot(k)
		if p < 0 || !(math.Abs(m.a[m.order[p]*n+k]) > zero*m.most[k]) {
			return false
		}
		m.order[k], m.order[p] = m.order[p], m.order[k]
		r := m.order[k]
		last := m.last[r]
		pivot := m.a[r*n+k : r*n+last+1]
		for _, i := range m.order[k+1:] {
			if m.a[i*n+k] == 0 {
				continue
			}
			m.last[i] = max(m.last[i], last)
			row := m.a[i*n+k : i*n+last+1]
			f := row[0] / pivot[0]
			row[0] = f
			for c := 1; c < len(row); c++ {
				row[c] -= f * pivot[c]
			}
		}
	}
	return true
}

// pivot returns the place in order of the pivot for a column, or −1.
func (m *skyline) pivot(k int) int {
	most := 0.0
	for _, i := range m.order[k:] {
		most = math.Max(most, math.Abs(m.a[i*m.n+k]))
	}
	best := -1
	for p := k; p < len(m.order); p++ {
		i := m.order[p]
		if v := math.Abs(m.a[i*m.n+k]); v > 0 && v >= 0.1*most && (best < 0 || m.last[i] < m.last[m.order[best]]) {
			best = p
		}
	}
	return best
}

// solve writes into x the solution for a right-hand side. It reports false where
// rows that repeat others contradict them, by more than a ten millionth of size.
func (m *skyline) solve(x, right []float64, size float64) bool {
	const enough = 1e-7
	agree := true
	for k, i := range m.order {
		row, sum := m.a[i*m.n:(i+1)*m.n], right[i]
		for c := m.first[i]; c < min(k, m.n); c++ {
			sum -= row[c] * x[c]
		}
		if k < m.n {
			x[k] = sum
		} else if magnitude(sum) > enough*size {
			agree = false
		}
	}
	for k := m.n - 1; k >= 0; k-- {
		i := m.order[k]
		row, sum := m.a[i*m.n:(i+1)*m.n], x[k]
		for c := k + 1; c <= m.last[i]; c++ {
			sum -= row[c] * x[c]
		}
		x[k] = sum / row[k]
	}
	return agree
}
