// Package planar solves any planar linkage: links, joints and drives as plain
// data, solved as Assur groups one after another.
package planar
