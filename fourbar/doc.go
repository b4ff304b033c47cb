// Package fourbar solves the four-bar linkage: a crank, a coupler and a follower
// on a frame, joined by four revolute joints.
package fourbar
