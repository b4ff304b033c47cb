package planar

import "math"

// A spread is a histogram of residuals over their magnitude, sixteen bins an octave:
// all that robust steps need to know of them.
type spread struct {
	count [spreads]int
	sum   [spreads]float64 // of squares
}

const (
	spreads = 2048
	octave  = 16
)

func (s *spread) add(x float64) {
	i := 0
	if x = math.Abs(x); x > 0 {
		i = min(max(int(math.Log2(x)*octave)+spreads/2, 0), spreads-1)
	}
	s.count[i]++
	s.sum[i] += x * x
}

// edge returns the least magnitude in a bin.
func edge(bin int) float64 { return math.Exp2(float64(bin-spreads/2) / octave) }

// cut returns from where on readings are outliers, of which there is a share at most:
// 3.5 standard deviations, from the median of the others. For readings of which a
// share is far off that is where (1 − share)/2 of all lie below, and of a normal
// distribution it is 0.6745 standard deviations.
func (s *spread) cut(share float64) float64 {
	all := 0
	for _, n := range s.count {
		all += n
	}
	left := float64(all) * (1 - share) / 2
	for i, n := range s.count {
		if left -= float64(n); left <= 0 {
			median := edge(i) * math.Exp2((1+left/float64(n))/octave)
			bin := int(math.Ceil(math.Log2(3.5*median/0.6745)*octave)) + spreads/2
			return edge(bin)
		}
	}
	return math.Inf(1)
}

// cost returns the mean square, those beyond the cut counting as at it.
func (s *spread) cost(cut float64) float64 {
	sum, all := 0.0, 0
	for i, n := range s.count {
		all += n
		if edge(i) < cut*(1-1e-9) {
			sum += s.sum[i]
		} else {
			sum += float64(n) * cut * cut
		}
	}
	return sum / float64(all)
}
