package main

import (
	"strings"
	"testing"
)

// FuzzShop: no shop file makes the program panic or print what is no number, and
// every complaint says where in the file.
func FuzzShop(f *testing.F) {
	const top = "units = \"mm\"\n"
	for _, text := range []string{
		string(shopExample), "", top, top + "[[pin]]\nsize = 3.5\ncount = 2", top + "[[pin]]\nfrom = 1\nto = 2\nstep = 0.1\nclass = \"ZZ minus\"",
		top + "[[ball]]\nsize = 1e300", top + "[[micrometer]]\nrange = \"0..25\"\nanvil = \"disc\"\nanvil_diameter = 20\nrim = 0.7",
		top + "[[caliper]]\nrange = \"0..6in\"\njaw = 1e-300", top + "[[tooth_caliper]]\ndp = \"1e-9..20\"", top + "[[pin]]\nsize = 3\nmeasured = [3.01, \"3.0in\"]",
		top + "[[form_cutter]]\ndp = 16\nnumbers = [1, 8.5]", top + "[[hob]]\nmodule = 2\nrack = \"ISO 53 C\"", top + "pin = [{size = 3}]", top + "[[end_mill]]\nsize = \"1/8in\"",
	} {
		f.Add(text)
	}
	j := exampleJobs(f)
	f.Fuzz(func(t *testing.T, text string) {
		s, err := parseShop([]byte(text), "shop.toml")
		if err != nil {
			p, ok := err.(*problem)
			if !ok || p.status != exitQuestion || !strings.HasPrefix(p.where, "shop.toml") || p.text == "" {
				t.Fatalf("%#v", err)
			}
			return
		}
		for _, j := range j {
			result := newTargets(j, j.gears, ask{shop: s})
			if _, err := jsonText(result); err != nil { // refuses NaN and infinities
				t.Errorf("%v of\n%s", err, text)
			}
			if out := string(result.text(&page{}, 3)); strings.Contains(out, "NaN") || strings.Contains(out, "Inf") {
				t.Errorf("no number of\n%s\n%s", text, out)
			}
		}
	})
}

// exampleJobs are a spur pair and a helical gear, worked out.
func exampleJobs(f *testing.F) []*job {
	var jobs []*job
	for _, text := range []string{
		"units = \"mm\"\n[tooth]\nmodule = 2\n[gear.a]\nteeth = 17\nshift = 0.2\nthin = \"0.02..0.06\"\nbore = 10\n[gear.b]\nteeth = 40\n",
		"units = \"in\"\n[gear.h]\ndp = 16\nteeth = 24\nhelix_angle = 20\nface_width = 1\n",
	} {
		r, err := parseJob([]byte(text), "job.toml")
		if err != nil {
			f.Fatal(err)
		}
		j, err := resolve(r)
		if err != nil {
			f.Fatal(err)
		}
		jobs = append(jobs, j)
	}
	return jobs
}
