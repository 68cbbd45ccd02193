package refdata

import (
	"math"
	"strings"
	"testing"
)

func TestMaterialByName(t *testing.T) {
	for name, id := range map[string]string{
		"4140": "4140", "42CrMo4": "4140", "aisi 4140": "4140", "C45": "1045", "6061-T6": "6061-T6", "6061 t6": "6061-T6", "6061": "6061-T6",
		"18CrNiMo7-6": "17CrNiMo6", "SAE 660": "C93200", "nylon 66": "PA66", "pom-c": "POM-C", "gray cast iron EN-GJL-250 / ASTM A48 class 35": "GG25",
	} {
		if m, err := MaterialByName(name); err != nil || m.ID != id {
			t.Errorf("%q: %q, %v", name, m.ID, err)
		}
	}
	for name, want := range map[string]string{"4141": `"4140"`, "": "blank", "PA6": `the nearest is "PA66"`} {
		if _, err := MaterialByName(name); err == nil || !strings.Contains(err.Error(), want) || !strings.Contains(err.Error(), "tables materials") {
			t.Errorf("%q: error %v, want %s", name, err, want)
		}
	}
}

func TestMaterials(t *testing.T) {
	owner := map[string]string{}
	for i, m := range Materials() {
		r := records("materials")[i]
		for _, n := range append(strings.Split(r.text("aliases"), "; "), m.ID, m.Name) {
			if n == "" {
				continue
			}
			if o, ok := owner[plain(n)]; ok {
				t.Errorf("%q means %s and %s", n, o, m.ID)
			}
			owner[plain(n)] = m.ID
			if got, err := MaterialByName(n); err != nil || got != m {
				t.Errorf("%q: %+v, %v", n, got, err)
			}
		}
		// metals and plastics of the trade lie well within these
		if m.Density < 1000 || m.Density > 9000 || m.E < 2500 || m.E > 215000 || m.Poisson < 0.25 || m.Poisson > 0.4 || m.Expansion < 9e-6 || m.Expansion > 120e-6 {
			t.Errorf("%+v is out of bounds", m)
		}
	}
	// handbook values (recalled): steel 205 GPa, 11.7e-6/K; aluminum 68.9 GPa = 10.0e6 psi within its three digits
	m, err := MaterialByName("1018")
	if err != nil || m.E != 205000 || m.Expansion != 11.7e-6 || m.Density != 7870 {
		t.Errorf("1018: %+v, %v", m, err)
	}
	m, err = MaterialByName("6061")
	if err != nil || math.Abs(m.E-10.0e6*0.00689475729) > 100 {
		t.Errorf("6061: %+v, %v", m, err)
	}
}

// Additive volumes: taking up water w (mass %) swells a plastic by w·ρ/3 linear
// (ρ in g/cm³) at most; measured values of nylons (recalled) stay below.
func TestSwell(t *testing.T) {
	n := 0
	for _, r := range records("materials") {
		if !r.has("water_sat_wt_pct") {
			continue
		}
		for _, state := range []string{"50rh", "sat"} {
			n++
			bound := r.number("water_"+state+"_wt_pct") * r.number("density_kg_m3") / 3000
			got := r.number("swell_" + state + "_lin_pct")
			nylon := strings.HasPrefix(r.text("id"), "PA")
			// printed to 0.01 %
			if nylon && got >= bound || !nylon && math.Abs(got-bound) > 0.005+1e-9 {
				t.Errorf("%s, %s: swell %g, bound %.4f", r.text("id"), state, got, bound)
			}
		}
	}
	if n != 10 {
		t.Errorf("%d values checked, want 10", n)
	}
}

// ISO 6336-5: the allowables beside a material are A x + B of the row it points to, sigma_FE twice the bending number.
func TestMaterialAllowables(t *testing.T) {
	checked := 0
	for _, m := range records("materials") {
		if !m.has("allowable_scheme") {
			continue
		}
		found := false
		for _, a := range records("gear_allowables") {
			if a.text("scheme") != m.text("allowable_scheme") || (a.text("code") != m.text("allowable_code") && a.text("material") != m.text("allowable_code")) {
				continue
			}
			found = true
			if !m.has("default_x") || !strings.HasPrefix(m.text("allowable_quality"), a.text("quality")) {
				continue
			}
			x := m.number("default_x")
			if x < a.number("x_min") || x > a.number("x_max") {
				t.Errorf("%s: hardness %g outside %s to %s", m.text("id"), x, a.text("x_min"), a.text("x_max"))
			}
			column, want := "sigma_Hlim_MPa", a.number("A")*x+a.number("B")
			if a.text("kind") == "bending" {
				column, want = "sigma_FE_MPa", 2*want
			}
			// printed without decimals
			if got := m.number(column); math.Abs(got-want) > 0.5+1e-9 {
				t.Errorf("%s: %s %g, by A x + B %g", m.text("id"), column, got, want)
			}
			checked++
		}
		if !found {
			t.Errorf("%s points to no allowable", m.text("id"))
		}
	}
	if checked < 14 {
		t.Errorf("only %d allowables checked", checked)
	}
}
