// Package dyad has the closed forms of the dyads: the Assur groups of two links
// and three joints. Each is solved in two steps, place and rates, so that a place
// without rates can be had where the rates are not determined.
//
// Notation of the comments: a×b = ax·by − ay·bx; a⊥ = (−ay, ax); s = ±1 the side
// on which the dyad is assembled. The joints with known motion are the outer
// ones, A and C; the one between the two links is B.
//
// The forms avoid the difference of nearly equal numbers: lengths enter as
// products of sums and differences of given lengths (Heron's formula), and the
// cross product of the two links, twice the area, is never formed again from
// their vectors.
package dyad
