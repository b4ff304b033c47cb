package rolling

// TwoSincos is twoSincos for the tests.
var TwoSincos = twoSincos
