module example.com/twopoint

go 1.26

require (
	github.com/google/go-cmp v0.7.0
	gonum.org/v1/gonum v0.17.0
)
