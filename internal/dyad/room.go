package dyad

// Reach returns (b + c)², the square of the largest |AC|, and (b − c)², that of
// the least.
func (k *RRR) Reach() (most, least float64) { return k.s, k.e }

// Room returns how far |AC|² = d2 is from the nearer end of its range, negative
// out of reach.
func (k *RRR) Room(d2 float64) float64 {
	if far, near := k.s-d2, d2-k.e; far < near {
		return far
	} else {
		return near
	}
}
