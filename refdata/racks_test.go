package refdata

import (
	"math"
	"strings"
	"testing"
)

// largestTipRadius is the geometry behind rho_max: the flank must stay straight
// down to the line of the addendum, and two tip radii must fit between the flanks.
func largestTipRadius(alphaDeg, clearance, dedendum float64) (straight, full float64) {
	alpha := alphaDeg * math.Pi / 180
	straight = clearance / (1 - math.Sin(alpha))
	full = (math.Pi/4 - dedendum*math.Tan(alpha)) / math.Tan((math.Pi/2-alpha)/2)
	return straight, full
}

func TestRackGeometry(t *testing.T) {
	for _, r := range records("racks") {
		name, c, h := r.text("name"), r.number("cP"), r.number("hfP")
		// decimals leave a few units in the last place
		if got := r.number("haP") + c; math.Abs(got-h) > 4e-16 {
			t.Errorf("%s: addendum and clearance make %g, dedendum %g", name, got, h)
		}
		straight, full := largestTipRadius(r.number("alpha_P_deg"), c, h)
		// rounded down to five decimals
		if limit := min(straight, full); r.number("rho_max") > limit || r.number("rho_max") < limit-1e-5 {
			t.Errorf("%s: rho_max %g, by geometry %g", name, r.number("rho_max"), limit)
		}
		// A printed radius must go between the flanks; it may pass the line of the
		// addendum by the rounding of its last printed digit only.
		if r.has("rhofP") && (r.number("rhofP") > full || r.number("rhofP") > straight+0.0005) {
			t.Errorf("%s: rhofP %g is above %g or %g", name, r.number("rhofP"), straight, full)
		}
	}
	// ISO 53:1998, clause on the fillet radius (recalled): at 20° the rule changes
	// at cP 0.295, and the full radius is reached at 0.396.
	at := func(c float64) (straight, full float64) { return largestTipRadius(20, c, 1+c) }
	if s, f := at(0.2950); s >= f {
		t.Errorf("0.295: %g, %g", s, f)
	}
	if s, f := at(0.2952); s <= f {
		t.Errorf("0.2952: %g, %g", s, f)
	}
	if _, f := at(0.396); math.Abs(f-0.396) > 0.0005 {
		t.Errorf("0.396: full radius %g", f)
	}
}

// TestFinePitchTipRadius holds the pitch named in the doc comment of DedendumExtraInch.
func TestFinePitchTipRadius(t *testing.T) {
	r, err := RackByName("20 full depth fine")
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct {
		pitch float64
		fits  bool
	}{{20, true}, {186, true}, {187, false}, {200, false}} {
		_, full := largestTipRadius(20, 0.2, r.Dedendum+r.DedendumExtraInch*c.pitch)
		if fits := r.TipRadius <= full; fits != c.fits {
			t.Errorf("P %g: fits %v, want %v", c.pitch, fits, c.fits)
		}
	}
}

func TestRackFor(t *testing.T) {
	for _, c := range []struct {
		name  string
		angle float64
		want  string
		deg   float64
	}{
		{"ISO 53 A", 0, "ISO 53 A", 20},
		{"iso53a", 20, "ISO 53 A", 20},
		{"ISO 53-D", 0, "ISO 53 D", 20},
		{"ISO 53 A", 25, "ISO 53 A", 25},
		{"25 full depth coarse", 0, "25 full depth coarse", 25},
		{"25° Full Depth Coarse", 25, "25 full depth coarse", 25},
		{"full depth coarse", 25, "25 full depth coarse", 25},
		{"full depth coarse", 0, "20 full depth coarse", 20},
		{"14½ full depth", 14.5, "14.5 full depth", 14.5},
		{"14.5 full depth", 0.25307274153917776 * 180 / math.Pi, "14.5 full depth", 14.5}, // there and back in radians
		{"full depth", 14.5, "14.5 full depth", 14.5},
		{"stub", 20, "20 stub", 20},
	} {
		r, err := RackFor(c.name, c.angle)
		if err != nil || r.Name != c.want || r.PressureAngleDeg != c.deg {
			t.Errorf("%q at %g: %q at %g, %v", c.name, c.angle, r.Name, r.PressureAngleDeg, err)
		}
	}
	for _, c := range []struct {
		name  string
		angle float64
		want  string
	}{
		{"25 full depth coarse", 20, "is for a pressure angle of 25°, but 20° is asked for"},
		{"full depth coarse", 22.5, `there is "20 full depth coarse" and "25 full depth coarse"`},
		{"full depth", 0, `there is "14.5 full depth"`},
		{"ISO 53 E", 0, `the nearest is "ISO 53 A"; the command "tables racks" lists all`},
		{"20 stup", 0, `the nearest is "20 stub"`},
		{"", 0, "is blank"},
		{"ISO 53 A", 90, "above 0° and below 90°"},
		{"ISO 53 A", -20, "above 0° and below 90°"},
		{"ISO 53 A", math.NaN(), "above 0° and below 90°"},
	} {
		if _, err := RackFor(c.name, c.angle); err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%q at %g: error %v, want %q", c.name, c.angle, err, c.want)
		}
	}
	r, err := RackFor("ISO 53 A", 25)
	if err != nil || !strings.HasPrefix(r.Remark, "proportions of a rack for 20°, used at 25°") || r.TipRadius != 0.38 {
		t.Errorf("ISO 53 A at 25°: %+v, %v", r, err)
	}
}

func TestRacks(t *testing.T) {
	seen := map[string]bool{}
	for _, r := range Racks() {
		if got, err := RackByName(r.Name); err != nil || got != r {
			t.Errorf("%q by name: %+v, %v", r.Name, got, err)
		}
		if seen[plain(r.Name)] {
			t.Errorf("%q: compared as another", r.Name)
		}
		seen[plain(r.Name)] = true
		if r.TipRadius <= 0 {
			t.Errorf("%q: tip radius %g", r.Name, r.TipRadius)
		}
	}
	// ISO 53:1998 table 1 (recalled): h*aP, h*fP, ρ*fP.
	for name, want := range map[string][3]float64{
		"ISO 53 A": {1, 1.25, 0.38}, "ISO 53 B": {1, 1.25, 0.3}, "ISO 53 C": {1, 1.25, 0.25}, "ISO 53 D": {1, 1.4, 0.39},
	} {
		r, err := RackByName(name)
		if got := [3]float64{r.Addendum, r.Dedendum, r.TipRadius}; err != nil || got != want || !r.HasTipRadius {
			t.Errorf("%s: %v, %v", name, got, err)
		}
	}
	if r, err := RackByName("20 stub"); err != nil || r.HasTipRadius || r.TipRadius != 0.30396 {
		t.Errorf("20 stub: %+v, %v", r, err)
	}
}
