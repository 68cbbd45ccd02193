package involute

import (
	"encoding/csv"
	"math"
	"os"
	"slices"
	"strconv"
	"strings"
	"testing"
)

// The tables in testdata/forty were computed with 50 digits by the script that
// stands beside them, from the formulas of ISO 21771:2007 and most of them a
// second way; nothing of this package is used there.

// A row is one line of a table by column name. An empty field is absent.
type row map[string]float64

func fortyTable(t *testing.T, name string) (header []string, rows []row) {
	t.Helper()
	f, err := os.Open("testdata/forty/" + name)
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	r := csv.NewReader(f)
	r.Comment = '#'
	lines, err := r.ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	for _, line := range lines[1:] {
		one := row{}
		for i, field := range line {
			if field == "" {
				continue
			}
			if one[lines[0][i]], err = strconv.ParseFloat(field, 64); err != nil {
				t.Fatalf("%s: %v", name, err)
			}
		}
		rows = append(rows, one)
	}
	return lines[0], rows
}

// columns keeps the worst disagreement of each column of a table, and which have been compared.
type columns struct {
	off map[string]float64
	row map[string]int
}

// see compares a result with the table's, where the table has one.
func (c *columns) see(i int, r row, name string, got float64) {
	want, ok := r[name]
	if !ok {
		return
	}
	if c.off == nil {
		c.off, c.row = map[string]float64{}, map[string]int{}
	}
	before, seen := c.off[name]
	if d := math.Abs(got - want); !seen || !(d <= before) {
		c.off[name], c.row[name] = d, i+1
	}
}

// judge holds every column of the header to its tolerance, inputs aside.
func (c *columns) judge(t *testing.T, header []string, inputs string, tolerance func(column string) float64) {
	t.Helper()
	for _, name := range header {
		if slices.Contains(strings.Fields(inputs), name) {
			continue
		}
		off, compared := c.off[name]
		if tol := tolerance(name); !compared || !(off <= tol) {
			t.Errorf("%s: compared %v, off by %.3g in row %d, at most %.3g allowed", name, compared, off, c.row[name], tol)
		}
		t.Logf("%-14s worst %.2g (row %d)", name, off, c.row[name])
	}
}

func (r row) spec(suffix string) Spec {
	return Spec{
		Teeth:  int(r["z"+suffix]),
		Module: r["m_n"],
		Helix:  r["beta_deg"] * Degree,
		Shift:  r["x"+suffix],
		Rack:   Rack{r["alpha_n_deg"] * Degree, r["haP"+suffix], r["hfP"+suffix], r["rhofP"+suffix]},
	}
}

// teeth returns the nominal and the thinned tooth of a row.
func (r row) teeth(t *testing.T, i int, suffix string, sign float64) (nominal, thinned Tooth) {
	t.Helper()
	s := r.spec(suffix)
	s.Helix *= sign
	g, err := NewGear(s)
	if err != nil {
		t.Fatalf("row %d: %v", i+1, err)
	}
	if nominal, err = g.Nominal(); err != nil {
		t.Fatalf("row %d: %v", i+1, err)
	}
	if thinned, err = g.Tooth(g.NominalThickness() - r["thin"+suffix]); err != nil {
		t.Fatalf("row %d: %v", i+1, err)
	}
	return nominal, thinned
}

const (
	fortyLength = 1e-9  // mm: what the program promises of every dimension and measure
	fortyAngle  = 1e-12 // degrees
	fortyRatio  = 1e-12 // contact ratios
	fortySlide  = 1e-9  // specific sliding, up to some hundreds where contact comes near the base circle
)

func TestFortyGears(t *testing.T) {
	header, rows := fortyTable(t, "gears.csv")
	if len(rows) < 200 {
		t.Fatalf("%d gears, at least 200 wanted", len(rows))
	}
	var c columns
	for i, r := range rows {
		nominal, tooth := r.teeth(t, i, "", 1)
		g := tooth.Gear
		see := func(name string, got float64) { c.see(i, r, name, got) }
		see("d", g.ReferenceDiameter())
		see("d_b", g.BaseDiameter())
		see("d_a", g.TipDiameter())
		see("d_f", nominal.RootDiameter())
		see("d_f_thinned", tooth.RootDiameter())
		see("d_Ff", nominal.FormDiameter())
		see("d_Ff_thinned", tooth.FormDiameter())
		see("s_n", tooth.Thickness())
		see("s_t", tooth.ThicknessAt(g.ReferenceDiameter()))
		see("s_an", nominal.TipThickness())
		see("p_bt", g.TransverseBasePitch())
		see("alpha_t_deg", g.TransversePressureAngle()/Degree)
		see("beta_b_deg", g.BaseHelix()/Degree)
		if nominal.Undercut() != (r["undercut"] == 1) {
			t.Errorf("row %d: undercut %v", i+1, nominal.Undercut())
		}
		k := int(r["k"])
		see("W_k", tooth.Span(k))
		see("W_contact_d", g.SpanContactDiameter(tooth.Span(k)))
		chord := tooth.Chord(g.TipDiameter())
		see("s_c", chord.Thickness)
		see("h_c", chord.Height)
		constant := tooth.ConstantChord(g.TipDiameter())
		see("s_cc", constant.Thickness)
		see("h_cc", constant.Height)
		if back, err := g.ThicknessFromSpan(k, r["W_k"]); err != nil {
			t.Errorf("row %d: %v", i+1, err)
		} else {
			see("s_n", back)
		}
		if _, ok := r["d_K"]; ok {
			c.seePins(t, i, r, tooth)
		}
	}
	c.judge(t, header, "m_n z alpha_n_deg beta_deg x haP hfP rhofP thin k D undercut", func(name string) float64 {
		if name == "alpha_t_deg" || name == "beta_b_deg" {
			return fortyAngle
		}
		return fortyLength
	})
}

// seePins compares every way over pins, and the thickness back from the table's reading.
func (c *columns) seePins(t *testing.T, i int, r row, tooth Tooth) {
	t.Helper()
	g, pin := tooth.Gear, r["D"]
	seat, err := tooth.Seat(pin)
	if err != nil {
		t.Errorf("row %d: %v", i+1, err)
		return
	}
	c.see(i, r, "d_K", seat.CenterDiameter)
	c.see(i, r, "pin_contact_d", seat.ContactDiameter)
	for name, way := range map[string]PinWay{"M": TwoPins, "M_opposed": OpposedPins, "M_three": ThreePins, "M_axis": PinToAxis, "M_free": FreePins} {
		m, ok := r[name]
		if !ok {
			continue
		}
		got, err := g.Reading(way, seat.CenterDiameter, pin, 0)
		if err != nil {
			t.Errorf("row %d, %s: %v", i+1, name, err)
			continue
		}
		c.see(i, r, name, got.Value)
		if way == FreePins {
			c.see(i, r, "M_free_offset", got.AxialOffset)
		}
		dK, err := g.CenterFromReading(way, m, pin, 0)
		if err != nil {
			t.Errorf("row %d, %s: %v", i+1, name, err)
			continue
		}
		back, err := g.ThicknessFromCenter(dK, pin)
		if err != nil {
			t.Errorf("row %d, %s: %v", i+1, name, err)
		}
		c.see(i, r, "s_n", back)
	}
}

func TestFortyMeshes(t *testing.T) {
	header, rows := fortyTable(t, "meshes.csv")
	var c columns
	for i, r := range rows {
		n1, t1 := r.teeth(t, i, "1", 1)
		n2, t2 := r.teeth(t, i, "2", -1)
		m, err := NewMesh(n1.Gear, n2.Gear)
		if err != nil {
			t.Fatalf("row %d: %v", i+1, err)
		}
		see := func(name string, got float64) { c.see(i, r, name, got) }
		tight, err := m.TightCenter(n1.Thickness(), n2.Thickness())
		if err != nil {
			t.Fatalf("row %d: %v", i+1, err)
		}
		see("a_tight", tight)
		a := r["a"]
		alpha, err := m.WorkingPressureAngle(a)
		if err != nil {
			t.Fatalf("row %d: %v", i+1, err)
		}
		see("alpha_wt_deg", alpha/Degree)
		dw1, dw2 := m.PitchDiameters(a)
		see("d_w1", dw1)
		see("d_w2", dw2)
		see("eps_beta", m.OverlapRatio(r["b"]))
		p, err := m.Backlash(a, t1.Thickness(), t2.Thickness())
		if err != nil {
			t.Fatalf("row %d: %v", i+1, err)
		}
		see("j_wt", p.Circumferential)
		see("j_bt", p.Base)
		see("j_bn", p.Normal)
		see("j_r", p.CenterPlay)
		c1, c2 := m.TipClearances(a, n1, n2)
		see("c1", c1)
		see("c2", c2)
		contact, err := m.Contact(a, n1, n2)
		if err != nil {
			t.Fatalf("row %d: %v", i+1, err)
		}
		see("eps_alpha_tips", contact.RatioByTips)
		see("eps_alpha", contact.TransverseRatio)
		for name, z := range map[string]Sliding{"zeta_A1": contact.SlidingA1, "zeta_A2": contact.SlidingA2, "zeta_E1": contact.SlidingE1, "zeta_E2": contact.SlidingE2} {
			if _, ok := r[name]; ok == z.Unbounded {
				t.Errorf("row %d, %s: unbounded %v", i+1, name, z.Unbounded)
			}
			see(name, z.Value)
		}
		see("d_Nf1", contact.Start1)
		see("d_Nf2", contact.Start2)
	}
	inputs := "m_n alpha_n_deg beta_deg a b z1 x1 haP1 hfP1 rhofP1 thin1 z2 x2 haP2 hfP2 rhofP2 thin2"
	c.judge(t, header, inputs, func(name string) float64 {
		switch kind, _, _ := strings.Cut(name, "_"); kind {
		case "alpha":
			return fortyAngle
		case "eps":
			return fortyRatio
		case "zeta":
			return fortySlide
		}
		return fortyLength
	})
}

func TestFortyInverse(t *testing.T) {
	var relative, absolute worst
	_, rows := fortyTable(t, "inverse.csv")
	for i, r := range rows {
		relative.see(Inv(r["alpha"])/r["inv_alpha"] - 1)
		got, ok := InverseInv(r["y"])
		if !ok {
			t.Errorf("row %d: no inverse", i+1)
		}
		absolute.see(got - r["alpha_of_y"])
	}
	relative.within(t, "inv, relative", 1e-14)
	absolute.within(t, "inverse inv, rad", 1e-14)
}
