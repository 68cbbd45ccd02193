package refdata

// CustomaryCoarse returns the customary backlash of coarse-pitch inch gears in
// mm, transverse at the operating pitch circle when assembled (Machinery's
// Handbook, after AGMA), by diametral pitch, 0.5 up to but not including 20, and
// center distance in inches, above 0 up to 120. A pitch between two printed ranges
// belongs to the coarser one, which so runs up to the next; a center distance on
// a limit to the lower of its ranges that has a value. Not every combination has one.
func CustomaryCoarse(dp, centerIn float64) (least, most float64, source Source, ok bool) {
	rs := records("backlash_coarse")
	start, ok := pitchStart(rs, dp)
	if !ok || reaches(dp, finePitch) || !(centerIn > 0) {
		return 0, 0, Source{}, false
	}
	for _, r := range rs {
		held := centerIn >= r.number("over_in")-sizeSlack && centerIn <= r.number("upto_in")+sizeSlack
		if held && r.number("p_from") == start {
			return r.number("least_in") * mmPerInch, r.number("most_in") * mmPerInch, r.source(), true
		}
	}
	return 0, 0, Source{}, false
}

// A FineClass is a class of backlash of fine-pitch inch gears; lengths are in mm.
type FineClass struct {
	Designation string  // A, the most backlash, to E
	Allowance   float64 // how much thinner than nominal the thickest allowed tooth of each gear is
	Tolerance   float64 // how much thinner than that the thinnest may be
	Least, Most float64 // backlash of the pair: 2 Allowance, 2 (Allowance + Tolerance)
	Source      Source
}

// CustomaryFine returns the classes of customary backlash at a diametral pitch
// from 20 to 200 (Machinery's Handbook, after AGMA), most backlash first; none at
// other pitches. A pitch between two printed ranges, as 45.5 between 45 and 46,
// belongs to the coarser one, which has the more backlash.
func CustomaryFine(dp float64) []FineClass {
	var classes []FineClass
	for _, group := range groups(records("backlash_fine"), "designation") {
		finest := group[len(group)-1].number("p_to")
		start, ok := pitchStart(group, dp)
		if !ok || dp > finest*(1+sameValue) {
			continue
		}
		for _, r := range group {
			if r.number("p_from") == start {
				classes = append(classes, FineClass{
					Designation: r.text("designation"),
					Allowance:   r.number("allowance_in") * mmPerInch,
					Tolerance:   r.number("tolerance_in") * mmPerInch,
					Least:       r.number("least_in") * mmPerInch,
					Most:        r.number("most_in") * mmPerInch,
					Source:      r.source(),
				})
			}
		}
	}
	return classes
}

// finePitch is the diametral pitch from which on gears are fine pitch (AGMA).
const finePitch = 20.0

// pitchStart returns where the range that holds a diametral pitch begins.
// Ranges are printed with gaps (to 45, from 46): each runs up to the next.
func pitchStart(rs []record, dp float64) (start float64, ok bool) {
	for _, r := range rs {
		if from := r.number("p_from"); reaches(dp, from) && (!ok || from > start) {
			start, ok = from, true
		}
	}
	return start, ok
}

// reaches reports whether a pitch is at least from; one that was worked out
// from a module may be off in the last place.
func reaches(dp, from float64) bool { return dp >= from*(1-sameValue) }
