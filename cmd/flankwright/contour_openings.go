package main

import "flankwright/export"

// measureOpenings holds bore, keyway, holes and hub of a file that was read back
// against what they should be, and refuses a file where one is not in its place.
func (j *job) measureOpenings(g *gear, back export.Outline) error {
	if _, err := g.contourSpec(j, g.middle(), 0).CheckOpenings(back); err != nil {
		return cannot("%s: in the file written there are %v; it is not delivered", called(g), err)
	}
	return nil
}
