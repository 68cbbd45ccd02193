package main

import (
	"math"
	"os"
	"path/filepath"
	"testing"

	"flankwright/inspect"
	"flankwright/involute"
)

// init keeps the shop file of whoever runs the tests out of them. The program that
// scripts run has its own settings.
func init() {
	folder, err := os.UserConfigDir()
	if err != nil || filepath.Base(os.Args[0]) == "flankwright" {
		return
	}
	if os.Getenv("GOENV") == "" {
		os.Setenv("GOENV", filepath.Join(folder, "go", "env")) // go list still finds its settings
	}
	for _, name := range []string{"XDG_CONFIG_HOME", "AppData"} { // Linux, Windows
		os.Setenv(name, filepath.Join(os.TempDir(), "no-flankwright-shop"))
	}
}

func mustParseShop(t *testing.T, text string) *shop {
	t.Helper()
	s, err := parseShop([]byte(text), "shop.toml")
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// Everything of the example shop file, as it was read.
func TestShopExample(t *testing.T) {
	s := mustParseShop(t, string(shopExample))
	if s.title != "Indexing fixture shop" || s.units != inspect.Millimeter || s.file != "shop.toml" {
		t.Errorf("%q in %v of %q", s.title, s.units, s.file)
	}
	first, second := s.stock.Pins[0], s.stock.Pins[1]
	if first.Diameter != 3.5003 || second.Diameter != 3.4999 || first.Nominal != 3.5 || first.Count != 1 || !first.Measured || first.From != "shop, drawer B" || first.Label != "3.5 mm" {
		t.Errorf("%+v, %+v", first, second)
	}
	if p := s.stock.Pins[2]; p.Off != (inspect.Limits{Min: -0.001, Max: 0.001}) || !p.Known || p.Measured || p.Count != 3 {
		t.Errorf("%+v", p)
	}
	if p := s.stock.Pins[3]; p.Nominal != 0.108*25.4 || p.Diameter != 0.10798*25.4 || p.Label != "0.108 in" {
		t.Errorf("%+v", p)
	}
	if p := s.stock.Pins[4]; math.Abs(p.Off.Min+0.00508) > 1e-15 || p.Off.Max != 0 || p.Class != "class ZZ minus" {
		t.Errorf("%+v", p)
	}
	set := s.stock.Pins[5:96] // 1 to 10 mm in steps of 0.1: 91
	for i, p := range set {
		if p.Nominal != float64(10+i)/10 || p.Count != 1 || p.Ball {
			t.Fatalf("pin %d of the set: %+v", i, p)
		}
	}
	if balls := s.stock.Pins[96:]; len(balls) != 2 || !balls[0].Ball || balls[0].Known || balls[1].Diameter != 2.9998 || balls[1].Count != 2 {
		t.Errorf("%+v", balls)
	}
	names := ""
	for _, g := range s.stock.Gauges {
		names += g.Name + "; "
	}
	if names != "0-25 mm micrometer; 25-50 mm micrometer; 50-75 mm micrometer; 75-100 mm micrometer; 0-25 mm disc micrometer; 25-50 mm disc micrometer; 0-150 mm caliper; " {
		t.Error(names)
	}
	if g := s.stock.Gauges; g[0].Uncertainty != 0.004 || g[1].Uncertainty != 0.003 || g[2].Uncertainty != 0.005 || g[6].Uncertainty != 0.03 || g[1].By != "the shop file" || g[2].By != "error limit, DIN 863-1" {
		t.Errorf("%+v", g)
	}
	if f := s.stock.Gauges[4].Face; f != (inspect.Face{Kind: inspect.DiscAnvil, Diameter: 20, Thickness: 0.7, Spindle: 8}) {
		t.Errorf("%+v", f)
	}
	if c := s.stock.ToothCalipers; len(c) != 1 || c[0].Modules != (inspect.Limits{Min: 1, Max: 12}) || c[0].Uncertainty != 0.02 {
		t.Errorf("%+v", c)
	}
	if m := s.endMills; len(m) != 2 || m[0] != (endMill{1.5, 1.492, true, 1, ""}) || m[1] != (endMill{3, 3, false, 2, ""}) {
		t.Errorf("%+v", m)
	}
	if c := s.formCutters; len(c) != 1 || c[0].module != 2 || len(c[0].numbers) != 7 || c[0].pressureAngle != 20 || c[0].dp != 0 {
		t.Errorf("%+v", c)
	}
	if h := s.hobs; len(h) != 1 || h[0] != (hob{25.4 / 16, 16, 20, "", ""}) {
		t.Errorf("%+v", h)
	}
}

// Classes as people write them, against the printed tolerances.
func TestPinClasses(t *testing.T) {
	for class, want := range map[string]inspect.Limits{
		"ZZ minus": {Min: -0.00508}, "zz-": {Min: -0.00508}, "class Z plus": {Max: 0.00254}, "X +": {Max: 0.001016}, "minus Y": {Min: -0.001778},
		"DIN 2269 class 0": {Min: -0.0005, Max: 0.0005}, "class 1": {Min: -0.001, Max: 0.001}, "2": {Min: -0.002, Max: 0.002},
	} {
		s := mustParseShop(t, "units = \"mm\"\n[[pin]]\nsize = 3.5\nclass = \""+class+"\"")
		if got := s.stock.Pins[0].Off; math.Abs(got.Min-want.Min) > 1e-12 || math.Abs(got.Max-want.Max) > 1e-12 {
			t.Errorf("%q: %v, want %v", class, got, want)
		}
	}
}

// A set's sizes are what is engraved on them, in inches too, and a shop file in inches says so.
func TestShopSets(t *testing.T) {
	s := mustParseShop(t, "units = \"in\"\n[[pin]]\nfrom = 0.061\nto = 0.25\nstep = 0.001\nclass = \"ZZ minus\"\n[[micrometer]]\nrange = \"1..2\"\n[[micrometer]]\nrange = \"25..50mm\"\nanvil_diameter = \"6.35mm\"\n[[tooth_caliper]]\ndp = \"2..20\"\n")
	if n := len(s.stock.Pins); n != 190 { // as the boxed set is counted
		t.Fatalf("%d pins", n)
	}
	for i, p := range s.stock.Pins {
		if p.Nominal != float64(61+i)/1000*25.4 {
			t.Errorf("pin %d: %v", i, p.Nominal)
		}
	}
	if p := s.stock.Pins[54]; p.Label != "0.115 in" || p.From != "shop, set in steps of 0.001 in" {
		t.Errorf("%+v", p)
	}
	if g := s.stock.Gauges; g[0].Name != "1-2 in micrometer" || g[0].Range != (inspect.Limits{Min: 25.4, Max: 50.8}) || g[1].Name != "25-50 mm micrometer" || g[1].Face.Diameter != 6.35 {
		t.Errorf("%+v", g)
	}
	if c := s.stock.ToothCalipers[0].Modules; c != (inspect.Limits{Min: 25.4 / 20, Max: 12.7}) {
		t.Errorf("%v", c)
	}
}

// What is taken is computed with the diameter that was measured: the limits over pins,
// turned back, are those of the thickness (trap 15: a rounded pin is another pin).
func TestTakeComputesWithTheMeasuredPin(t *testing.T) {
	r, err := parseJob([]byte("units = \"mm\"\n[gear.a]\nmodule = 2\nteeth = 21\nbore = 12\nthin = \"0.04..0.08\"\n"), "job.toml")
	if err != nil {
		t.Fatal(err)
	}
	j, err := resolve(r)
	if err != nil {
		t.Fatal(err)
	}
	for text, want := range map[string]float64{
		"size = 3.5\nmeasured = 3.4871\ncount = 2":  3.4871,
		"size = 3.5\nmeasured = [3.4871, 3.4973]":   3.4922,
		"size = 3.5\nmeasured = \"0.1375in\"":       0.1375 * 25.4, // one alone, to the axis
		"size = 3.5\nclass = \"Z plus\"\ncount = 2": 3.5,
	} {
		s := mustParseShop(t, "units = \"mm\"\n[[pin]]\n"+text+"\n[[micrometer]]\nrange = \"25..50\"\n")
		got := newTargets(j, j.gears, ask{shop: s}).gears[0]
		if len(got.Take) == 0 || got.Take[0].PinDiameter == nil || math.Abs(*got.Take[0].PinDiameter-want) > 1e-9 || *got.Take[0].PinNominal != 3.5 {
			t.Errorf("%q: %+v", text, got.Take)
			continue
		}
		p, way := got.OverPins[0], involute.TwoPins
		reading := p.Measurement
		if got.Take[0].What != "over pins" {
			way, reading = involute.PinToAxis, nil
			for _, a := range p.Also {
				if a.Way == got.Take[0].What {
					reading = a.Measurement
				}
			}
		}
		if reading == nil {
			t.Errorf("%q: no reading for %s", text, got.Take[0].What)
			continue
		}
		m := inspect.OverPins{Pin: want, Way: way}
		thin, err1 := m.Thickness(j.gears[0].g, reading.Min)
		thick, err2 := m.Thickness(j.gears[0].g, reading.Max)
		if err1 != nil || err2 != nil || math.Abs(thin-got.Thickness.Min) > 1e-9 || math.Abs(thick-got.Thickness.Max) > 1e-9 {
			t.Errorf("%q: %v to %v, not %v (%v, %v)", text, thin, thick, got.Thickness, err1, err2)
		}
	}
}
