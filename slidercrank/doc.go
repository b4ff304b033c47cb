// Package slidercrank solves the slider-crank, in line or offset, and its
// inversions: slotted lever, quick return, oscillating cylinder, Scotch yoke, and
// the rod with both ends guided.
package slidercrank
