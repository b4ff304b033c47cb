package rigid_test

import (
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

var (
	sinkPoint  rigid.Point
	sinkMotion rigid.Motion
	sinkPath   rigid.Path
	sinkVec    r2.Vec
)

// benchMotions are independent inputs, so that no run waits for the one before.
var benchMotions = func() (m [256]rigid.Motion) {
	rnd := newRandom(1)
	for i := range m {
		m[i] = rnd.motion()
	}
	return m
}()

var benchPoints = func() (p [256]rigid.Point) {
	rnd := newRandom(2)
	for i := range p {
		p[i] = rnd.point()
	}
	return p
}()

func BenchmarkAt(b *testing.B) {
	b.ReportAllocs()
	i := 0
	for b.Loop() {
		sinkPoint = benchMotions[i&255].At(benchPoints[i&255].Pos)
		i++
	}
}

func BenchmarkCarry(b *testing.B) {
	b.ReportAllocs()
	i := 0
	for b.Loop() {
		sinkPoint = benchMotions[i&255].Carry(benchPoints[i&255])
		i++
	}
}

func BenchmarkObserve(b *testing.B) {
	b.ReportAllocs()
	i := 0
	for b.Loop() {
		sinkPoint = benchMotions[i&255].Observe(benchPoints[i&255])
		i++
	}
}

func BenchmarkCompose(b *testing.B) {
	b.ReportAllocs()
	i := 0
	for b.Loop() {
		sinkMotion = benchMotions[i&255].Compose(&benchMotions[(i+1)&255])
		i++
	}
}

func BenchmarkPath(b *testing.B) {
	b.ReportAllocs()
	i := 0
	for b.Loop() {
		sinkPath, _ = benchPoints[i&255].Path()
		i++
	}
}

func BenchmarkPole(b *testing.B) {
	b.ReportAllocs()
	i := 0
	for b.Loop() {
		sinkVec, _ = benchMotions[i&255].Pole()
		i++
	}
}

func BenchmarkGuided(b *testing.B) {
	b.ReportAllocs()
	i := 0
	for b.Loop() {
		p := &benchPoints[(i+1)&255]
		sinkMotion, _, _ = rigid.Guided(benchPoints[i&255], p.Pos, p.Vel)
		i++
	}
}

func BenchmarkFit(b *testing.B) {
	b.ReportAllocs()
	locals := make([]r2.Vec, 16)
	points := make([]rigid.Point, 16)
	for i := range locals {
		locals[i] = benchPoints[i].Pos
		points[i] = benchMotions[0].At(locals[i])
	}
	for b.Loop() {
		sinkMotion, _, _ = rigid.Fit(locals, points)
	}
}
