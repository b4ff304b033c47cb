package slidercrank

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/internal/dims"
	"example.com/twopoint/internal/dyad"
	"example.com/twopoint/internal/trig"
	"example.com/twopoint/rigid"
)

// QuickReturnDimensions are those of a QuickReturn and where it is mounted: a
// slotted lever, whose axes are the mechanism's own, and a ram that a pin of the
// lever drives. In the usual drive the ram's travel is square to the line of
// centres, Guide.Angle = π/2; with a turning lever it mostly passes through the
// lever pivot, Guide.X = −Centre. More fields may come: write keyed literals.
type QuickReturnDimensions struct {
	Crank    float64         `json:"crank"`    // crank pivot to crank pin, m
	Centre   float64         `json:"centre"`   // crank pivot to lever pivot, m
	Slot     float64         `json:"slot"`     // from the lever pivot to the slot, m, as in LeverDimensions
	Arm      float64         `json:"arm"`      // lever pivot to the lever's output pin, m
	ArmAngle float64         `json:"armAngle"` // of the output pin in the lever from the slot's direction, rad
	Rod      float64         `json:"rod"`      // output pin to ram pin, m; 0: the output pin runs in a slot of the ram, square to its travel
	Branch   Branch          `json:"branch"`   // of the rod: ram pin at greater (Ahead) or smaller travel than the output pin
	Guide    rigid.Placement `json:"guide"`    // of the ram's travel, along its x axis, in the mechanism's own axes; its origin is at Travel 0
	Mount    rigid.Placement `json:"mount"`    // of the mechanism's own axes in the machine
}

// QuickReturnState is the motion of a QuickReturn at one instant, that of its
// lever included. Ram has its origin at its pin, or where its slot crosses the
// guide, and its x axis along the travel. Rod has its origin at the output pin and
// its x axis to the ram pin; without a rod it is the block in the ram's slot, with
// the ram's axes. Margin is the least of the lever's and the rod's. More fields may
// come.
type QuickReturnState struct {
	LeverState
	Rod, Ram rigid.Motion
	Travel   rigid.Coordinate // of the ram along Guide, m
	Elbow    rigid.Side       // of the line from the lever pivot to the ram pin: see SolveTravel
}

// A QuickReturn is a shaper drive: crank, slotted lever, rod and ram. It cuts
// slowly and returns fast. The zero QuickReturn gives ErrInput. Any number of
// goroutines may share one.
type QuickReturn struct {
	given  QuickReturnDimensions
	form   slotForm
	arm    float64
	bend   r2.Vec // unit vector of the arm in the lever
	side   float64
	byArm  dyad.RRP
	byRam  dyad.RRR
	swings [4]float64 // of the lever at its limits
	size   float64    // the largest length
	ram    r2.Vec     // unit vector of the travel, in the frame
	foot   r2.Vec     // the lever pivot from Guide's origin, in Guide's axes
	toPin  r2.Vec     // turns the lever's unit vector in the frame into the arm's in Guide's axes
	zero   r2.Vec     // Guide's origin in the frame
}

// NewQuickReturn checks the dimensions and returns the drive. Errors are
// *rigid.DimensionError, joined if several: those of NewSlottedLever, Arm must be a
// positive length, Rod positive or 0, Branch Ahead or Behind; rigid.ErrUnreachable,
// with an empty Name, where the rod reaches the guide at no angle of the crank.
func NewQuickReturn(d QuickReturnDimensions) (*QuickReturn, error) {
	if err := d.check(); err != nil {
		return nil, err
	}
	mount, guide := d.Mount.Pose(), d.Guide.Pose()
	sin, cos := math.Sincos(d.ArmAngle)
	q := &QuickReturn{
		given: d,
		form:  newSlotForm(d.Crank, d.Centre, d.Slot, d.Mount),
		arm:   d.Arm, bend: r2.Vec{X: cos, Y: sin}, side: 1,
		byArm: dyad.RRP{L: d.Rod},
		size:  max(d.Crank, d.Centre, math.Abs(d.Slot), d.Arm, d.Rod),
		ram:   turned(mount.Axis, guide.Axis),
		foot:  guide.Local(r2.Vec{X: -d.Centre}),
		zero:  mount.Point(guide.Origin),
	}
	q.size = max(q.size, math.Abs(q.foot.X), math.Abs(q.foot.Y))
	q.form.size = q.size // of the swing that SolveTravel finds
	q.swings = q.form.swings()
	q.toPin = turned(q.bend, r2.Vec{X: q.ram.X, Y: -q.ram.Y})
	if d.Branch == Behind {
		q.side = -1
	}
	if d.Rod > 0 {
		q.byRam = dyad.NewRRR(d.Arm, d.Rod)
	}
	if len(q.Range()) == 0 {
		return nil, &rigid.DimensionError{Err: errRam}
	}
	return q, nil
}

// check returns every *rigid.DimensionError of the dimensions, joined.
func (d QuickReturnDimensions) check() error {
	var f dims.Faults
	if err := checkSlot(d.Crank, d.Centre, d.Slot, "Slot", d.Mount); err != nil {
		f = append(f, err)
	}
	f.Length("Arm", d.Arm)
	f.Number("ArmAngle", d.ArmAngle)
	if d.Rod != 0 {
		f.Length("Rod", d.Rod)
	}
	f.Distance("Guide.X", d.Guide.X)
	f.Distance("Guide.Y", d.Guide.Y)
	f.Number("Guide.Angle", d.Guide.Angle)
	if !branches.Has(d.Branch) {
		f.Add("Branch", float64(d.Branch), errBranch)
	}
	return f.Err()
}

// Dimensions returns what NewQuickReturn was given.
func (q *QuickReturn) Dimensions() QuickReturnDimensions { return q.given }

// Solve writes into dst the motion of all links for a motion of the crank, turn in
// rad counter-clockwise from the direction away from the lever pivot. Margin is the
// lesser of the slotted lever's and |cos| of the angle between rod and guide, 0 at
// the ends of Range and where no more than rounding keeps the crank from one.
// Errors: ErrUnreachable outside Range; ErrSingular for rates where Margin is below
// rigid.LeastMargin; ErrNotFinite; ErrInput for a zero QuickReturn. An error leaves
// dst as it was.
func (q *QuickReturn) Solve(dst *QuickReturnState, turn rigid.Coordinate) error {
	var m slotMotion
	var r ramMotion
	if err := q.solve(&m, &r, turn); err != nil {
		return err
	}
	q.write(dst, &m, &r)
	return nil
}

// Coefficients returns the ram's travel and its derivatives by the crank's angle,
// turn in rad: a rigid.Law. Errors as Solve asked for rates.
func (q *QuickReturn) Coefficients(turn float64) (rigid.Coefficients, error) {
	var m slotMotion
	var r ramMotion
	if err := q.solve(&m, &r, rigid.Coordinate{Pos: turn, Vel: 1}); err != nil {
		return rigid.Coefficients{}, err
	}
	return rigid.Coefficients{In: turn, Out: r.travel.Pos, First: r.travel.Vel, Second: r.travel.Acc}, nil
}

func (q *QuickReturn) solve(m *slotMotion, r *ramMotion, turn rigid.Coordinate) error {
	sh, ch := trig.Sincos(turn.Pos / 2)
	d2, s2 := q.form.squares(ch)
	if err := q.form.place(m, turn, sh, ch, d2, s2); err != nil {
		return err
	}
	return q.push(r, m)
}
