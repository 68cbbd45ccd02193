package main

import "flankwright/export"

// openingFaults holds bore, keyway, holes and hub of a file that was read back
// against what they should be. It is for a gear alone: in a mesh they stand turned.
func openingFaults(spec export.ContourSpec, back export.Outline) []string {
	if _, err := spec.CheckOpenings(back); err != nil {
		return []string{err.Error()}
	}
	return nil
}
