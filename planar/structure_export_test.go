package planar

// Checks returns what of a linkage is checked instead of solved.
func Checks(l *Linkage) []string {
	var units []string
	for _, c := range l.system.checks {
		units = append(units, c.unit)
	}
	return units
}
