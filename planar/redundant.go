package planar

// An aside says, by joint, what of a design is not solved but checked.
type aside map[int]setting

type setting uint8

const (
	kept    setting = iota
	dropped         // all of it that is no angle
)
