package refdata

// Error limits of hand instruments, as the table instruments lists them: what
// the instrument itself may be off by, plus and minus, mm. The hand, the
// temperature and the pins come on top.

// MicrometerLimit returns the error limit of an external micrometer with flat
// anvils (DIN 863-1) by the lower end of its 25 mm or 1 in of range, mm. It
// reports false below 0 and beyond the table.
func MicrometerLimit(from float64) (limit float64, src Source, ok bool) {
	return rangeLimit("external micrometer", from)
}

// DiscMicrometerLimit is MicrometerLimit for discs (customary limits).
func DiscMicrometerLimit(from float64) (limit float64, src Source, ok bool) {
	return rangeLimit("disc (flange) micrometer", from)
}

// coarseCaliper is the graduation from which a caliper counts as one of 0.05 mm:
// 1/128 in is 0.198, 0.001 in is 0.0254 mm.
const coarseCaliper = 0.03

// CaliperLimit returns the error limit of a caliper for outside measurements up
// to a length (DIN 862), by its graduation, mm; 0 stands for a fine one. It
// reports false beyond the table.
func CaliperLimit(upto, graduation float64) (limit float64, src Source, ok bool) {
	name := "digital, dial or vernier caliper 0.01 or 0.02 mm"
	if graduation > coarseCaliper {
		name = "vernier or dial caliper 0.05 mm"
	}
	for _, r := range limitRows(name) {
		if upto <= r.number("upto")+sizeSlack {
			return r.scaled("value", -3), instrumentSource(r), true
		}
	}
	return 0, Source{}, false
}

// ToothCaliperLimit returns the error limit of each scale of a gear tooth
// caliper (customary), mm.
func ToothCaliperLimit() (limit float64, src Source) {
	r := limitRows("gear tooth caliper, vernier 0.02 mm")[0]
	return r.scaled("value", -3), instrumentSource(r)
}

// rangeLimit returns the limit of the row whose range holds a lower end.
func rangeLimit(name string, from float64) (limit float64, src Source, ok bool) {
	for _, r := range limitRows(name) {
		if from >= r.number("over")-sizeSlack && from < r.number("upto")-sizeSlack {
			return r.scaled("value", -3), instrumentSource(r), true
		}
	}
	return 0, Source{}, false
}

// limitRows returns the limit rows of an instrument, in the table's order.
func limitRows(name string) []record {
	var rows []record
	for _, r := range records("instruments") {
		if r.text("record") == "limit" && r.text("instrument") == name {
			rows = append(rows, r)
		}
	}
	return rows
}

// instrumentSource is a row's source with the standard that it names.
func instrumentSource(r record) Source {
	s := r.source()
	s.Standard = r.text("basis")
	return s
}
