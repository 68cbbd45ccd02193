package refdata

import "strings"

// A Material is a gear or housing material with typical values at room
// temperature. A bar's certificate overrides them.
type Material struct {
	ID        string
	Name      string
	Condition string
	Density   float64 // kg/m³
	E         float64 // Young's modulus, MPa; plastics: dry
	Poisson   float64
	Expansion float64 // linear, 1/K, mean from 20 to about 100 °C
	Hardness  string  // with its scale
	Source    Source
}

// Materials returns the materials: steels, irons, copper alloys, aluminum, plastics.
func Materials() []Material {
	rs := records("materials")
	all := make([]Material, len(rs))
	for i, r := range rs {
		all[i] = material(r)
	}
	return all
}

// MaterialByName returns the material by its short name ("4140"), its full
// name or another name of it ("42CrMo4", "AISI 4140"). The error of an unknown
// name says which is nearest and how to list all.
func MaterialByName(name string) (Material, error) {
	var names []string
	for _, r := range records("materials") {
		own := []string{r.text("id"), r.text("name")}
		if r.has("aliases") {
			own = append(own, strings.Split(r.text("aliases"), "; ")...)
		}
		for _, n := range own {
			if plain(n) == plain(name) {
				return material(r), nil
			}
		}
		names = append(names, own...)
	}
	return Material{}, unknown("material", name, names, "materials")
}

func material(r record) Material {
	return Material{
		ID:        r.text("id"),
		Name:      r.text("name"),
		Condition: r.text("condition"),
		Density:   r.number("density_kg_m3"),
		E:         r.scaled("E_GPa", 3),
		Poisson:   r.number("poisson"),
		Expansion: r.scaled("cte_1e-6_per_K", -6),
		Hardness:  r.text("hardness"),
		Source:    r.source(),
	}
}
