// Package rigid describes how rigid bodies and their points move in a plane.
package rigid
