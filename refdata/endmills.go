package refdata

// An EndMill is an end mill diameter as it is usually sold.
type EndMill struct {
	Size     string  // name in the shop: "3" (mm) or "1/8" (in)
	Unit     string  // "mm" or "in"
	Diameter float64 // mm, nominal
	Tier     int     // 1 in every shop catalog, 2 easily bought, 3 bought on purpose
	Source   Source
}

// EndMills returns the usual end mill diameters, metric first, each ascending.
func EndMills() []EndMill {
	rs := records("end_mills")
	mills := make([]EndMill, len(rs))
	for i, r := range rs {
		unit := "mm"
		if r.text("system") == "inch" {
			unit = "in"
		}
		mills[i] = EndMill{r.text("size"), unit, r.number("diameter_mm"), int(r.number("tier")), r.source()}
	}
	return mills
}
