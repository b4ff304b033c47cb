package slidercrank

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/internal/dims"
	"example.com/twopoint/internal/trig"
	"example.com/twopoint/rigid"
)

// A slotForm is a crank of length r about the origin whose pin runs in a line that
// turns about (−c, 0) and passes it at the distance |e|: the chain of the slotted
// lever and of the oscillating cylinder. With d from the pivot of the line to the
// pin, u along the line, σ along it, φ the crank's angle and ψ the line's,
//
//	d = c + r·exp(iφ) = u·(σ + ie),  u = exp(iψ)
//	D² = |d|² = (r − c)² + 4rc·cos²(φ/2),  σ² = D² − e²
//
// Every square is a sum of products of given lengths and of the half angle's
// cosine, so that nothing cancels where the pin comes near to the pivot.
type slotForm struct {
	r, c, e    float64
	across     float64 // the shorter, negative where it is c: d is reckoned along the longer
	twice      float64 // 2 × the shorter
	gap, gap2  float64 // |r − c| and its square
	least      float64 // gap² − e², of σ²
	most       float64 // (r + c)² − e²
	minus      float64 // −rc
	perCrank   float64 // 1/r
	near       float64 // r(r − c)
	rc2, rc4   float64 // 2rc, 4rc
	difference float64 // (r − c)(r + c)
	slack      float64 // of σ², for positions that are a rounding beyond the limit
	floor      float64 // of σ², below which it is the rounding of a crank at its limit
	clear      float64 // of σ², above which a position is clear of every limit
	size       float64 // the largest length
	mount      rigid.Pose
	pivot      r2.Vec // of the line, in the frame
}

// newSlotForm returns the form of a crank r at the distance c from the pivot of a
// line offset by e, all checked.
func newSlotForm(r, c, e float64, mount rigid.Placement) slotForm {
	long, short, across := c, r, r
	if r > c {
		long, short, across = r, c, -c
	}
	m, d := mount.Pose(), math.Abs(e)
	gap, size, past := long-short, max(long, d), long-d
	least := (gap - d) * (gap + d)
	if d > short { // the longer of the two first: where lengths nearly cancel that difference is exact
		least = (past - short) * (gap + d)
	}
	floor := 0.0
	if least < 0 { // at the limit 4rc cos²(φ/2) = −least, and dσ²/dφ = −2rc sin φ
		floor = equal * (-least + 2*math.Sqrt(-least*r*c))
	}
	return slotForm{
		r: r, c: c, e: e,
		across: across, twice: 2 * short, size: size,
		gap: gap, gap2: gap * gap, least: least, most: (past + short) * (long + short + d), floor: floor,
		clear: max(floor, 4*rigid.LeastMargin*rigid.LeastMargin*r*r),
		minus: -r * c, perCrank: 1 / r, near: r * (r - c), rc2: 2 * r * c, rc4: 4 * r * c, difference: (r - c) * (r + c),
		slack: 2 * beyond * size * d,
		mount: m,
		pivot: m.Point(r2.Vec{X: -c}),
	}
}

// A slotMotion is the motion of the crank and of the line in which its pin runs,
// before it is written out.
type slotMotion struct {
	crank, line  r2.Vec // unit vectors, in the frame
	turn         rigid.Coordinate
	swing, slide rigid.Coordinate
	margin       float64
}

// squares returns D² and σ² for the cosine of half the crank's angle.
func (k *slotForm) squares(ch float64) (d2, s2 float64) {
	span := k.rc4 * (ch * ch)
	return k.gap2 + span, k.least + span
}

// along returns u·exp(−iφ) where k.across is negative, else u, for σ, half = cos²(φ/2),
// sin φ and i = 1/D²: d is reckoned along the longer of crank and centre line.
func (k *slotForm) along(s, half, sin, i float64) r2.Vec {
	dx, dy := k.gap+k.twice*half, k.across*sin
	return r2.Vec{X: (s*dx + k.e*dy) * i, Y: (s*dy - k.e*dx) * i}
}

// swing returns the derivatives of ψ by the crank's angle φ, for half and i as along
// has them and j = 1/σ². From (d log d)/dφ = ir·exp(iφ)/d, the imaginary part of
// whose derivative is rc(r² − c²)sin φ/D⁴, and ψ = arg d − asin(e/D),
//
//	ψ'  = [r(r − c) + 2rc cos²(φ/2) − (e/σ)·rc sin φ]/D²
//	ψ'' = rc{(r² − c²)sin φ/D⁴ − (e/σ)[((r − c)²cos φ + 4rc cos²(φ/2))/D⁴ + rc sin²φ/(D²σ²)]}
func (k *slotForm) swing(s, half, sin, cos, i, j float64) (first, second float64) {
	q, e := k.minus*sin, k.e*(s*j)
	along := k.rc2 * half
	first = (k.near + along + e*q) * i
	return first, k.minus * i * ((e*(k.gap2*cos+(along+along))-k.difference*sin)*i - e*q*sin*j)
}

// slide returns the derivatives of σ, as swing does those of ψ:
//
//	σ'  = −rc sin φ/σ
//	σ'' = −rc[((r − c)² − e²)cos φ + 4rc cos⁴(φ/2)]/σ³
func (k *slotForm) slide(s, half, sin, cos, j float64) (first, second float64) {
	i := s * j // 1/σ
	return k.minus * sin * i, k.minus * i * j * (k.least*cos + k.rc4*half*half)
}

// margin returns σ over the crank, at most 1.
func (k *slotForm) margin(s float64) float64 {
	if s > k.r {
		return 1
	}
	return s * k.perCrank
}

// place solves the position for the crank's angle φ, the sine and cosine of its
// half, D² and σ², all cases of it: SlottedLever.Solve is quicker in the usual
// one.
//
// At the limit of a crank that cannot turn fully σ is 0 and there are no
// derivatives. The swing is continuous in φ: less the turn of the longer of crank
// and centre line it stays within ±π.
func (k *slotForm) place(m *slotMotion, turn rigid.Coordinate, sh, ch, d2, s2 float64) error {
	if turn.Pos*0+turn.Vel*0+turn.Acc*0 != 0 {
		return rigid.ErrNotFinite
	}
	by := s2
	if !(s2 > k.floor) {
		if !(s2 >= -k.slack) || d2 == 0 {
			return k.nowhere()
		}
		s2, by = 0, d2
	}
	t, s := 1/(d2*by), math.Sqrt(s2) // one division, beside the root
	i, j, half := by*t, d2*t, ch*ch
	sin, cos := 2*sh*ch, (ch-sh)*(ch+sh)
	u := k.along(s, half, sin, i)
	if s == 0 { // D is |e| no closer than the rounding of σ²
		u = r2.Unit(u)
	}
	m.margin = k.margin(s)
	m.slide.Pos, m.turn = s, turn
	if w, al := turn.Vel, turn.Acc; w != 0 || al != 0 {
		if m.margin < rigid.LeastMargin {
			return rigid.ErrSingular
		}
		swing1, swing2 := k.swing(s, half, sin, cos, i, j)
		slide1, slide2 := k.slide(s, half, sin, cos, j)
		w2 := w * w
		m.swing.Vel, m.swing.Acc = swing1*w, swing1*al+swing2*w2
		m.slide.Vel, m.slide.Acc = slide1*w, slide1*al+slide2*w2
		if (m.swing.Acc+m.slide.Acc+k.r*(math.Abs(al)+w2))*0 != 0 {
			return rigid.ErrNotFinite
		}
	}
	m.crank = turned(k.mount.Axis, r2.Vec{X: cos, Y: sin})
	if k.across < 0 {
		m.line = turned(m.crank, u)
		m.swing.Pos = turn.Pos + trig.Angle(u.X, u.Y)
	} else {
		m.line = turned(k.mount.Axis, u)
		m.swing.Pos = trig.Angle(u.X, u.Y)
	}
	return nil
}

// nowhere is the error of a position that does not exist, or of a mechanism that
// no constructor made.
func (k *slotForm) nowhere() error {
	if k.r == 0 {
		return rigid.ErrInput
	}
	return rigid.ErrUnreachable
}

// checkSlot returns every *rigid.DimensionError of a slotForm's dimensions, joined;
// offset is the field's name for e.
func checkSlot(r, c, e float64, offset string, mount rigid.Placement) error {
	var f dims.Faults
	f.Length("Crank", r)
	f.Length("Centre", c)
	f.Distance(offset, e)
	f.Mount(mount)
	if !f.OK() {
		return f.Err()
	}
	longer, d := max(r, c), math.Abs(e)
	switch {
	case r+c-d <= equal*longer:
		f.Add("", 0, errSlot)
	case math.Abs(math.Abs(r-c)-d) <= beyond*longer:
		f.Add("", 0, errFlat)
	}
	return f.Err()
}

// follow returns the line's angle a plus the whole turns that make it continuous in
// the crank's angle, as place does.
func (k *slotForm) follow(a, turn float64) float64 {
	if k.across < 0 {
		return rigid.Nearest(a, turn)
	}
	return rigid.Wrap(a)
}
