package main

import (
	"math"
	"strings"
	"testing"

	"flankwright/inspect"
)

// badConditions are wrong words about what a gear is made of and how well.
func badConditions() []badJob {
	return []badJob{
		{oneGear + "runout = -0.01\n", "5:10", []string{"runout: is the indicator's total reading, 0 or more"}},
		{oneGear + "runout = \"some\"\n", "5:10", []string{`"some" is not a length`}},
		{oneGear + "swell = 12\n", "5:9", []string{"swell: is linear, in percent from dry, from 0 to 10"}},
		{oneGear + "swell = -0.1\n", "5:9", []string{"from 0 to 10"}},
		{oneGear + "swell = \"0.6..0.1\"\n", "5:9", []string{"runs backwards"}},
		{oneGear + "swell = \"0.1-0.6\"\n", "5:9", []string{"0.1..0.6"}},
		{oneGear + "swell = \"wet\"\n", "5:9", []string{`"wet" is not a percentage`, "0.1..0.6"}},
		{oneGear + "swell = nan\n", "5:9", []string{"is not a percentage"}},
		{oneGear + "swell = true\n", "5:9", []string{"swell: needs a percentage", "not true or false"}},
		{oneGear + "material = 4140\n", "5:12", []string{"material: needs a name", "not a number"}},
		{oneGear + "material = { }\n", "5:12", []string{"needs a name from the tables, or an expansion"}},
		{oneGear + "material = { name = 3, expansion = 20.5 }\n", "5:21", []string{"name: needs a text"}},
		{oneGear + "material = { name = \"brass bar\", expansion = 20.5e-6 }\n", "5:46", []string{"expansion: is in 1e-6/K", "20.5 for brass", "2.05e-05"}},
		{oneGear + "material = { expansion = 2050 }\n", "5:26", []string{"expansion: is in 1e-6/K"}},
		{oneGear + "material = { expansoin = 20.5 }\n", "5:14", []string{"expansoin: no such key in material; did you mean expansion?"}},
		{oneGear + "accuracy = 8\n", "5:12", []string{"accuracy: 8 alone is not enough", "quality numbers run the other way", `accuracy = "ISO 1328-1:2013 class 8"`}},
		{oneGear + "accuracy = \"8\"\n", "5:12", []string{"8 alone is not enough"}},
		{oneGear + "accuracy = \" \"\n", "5:12", []string{"needs a standard and a class"}},
		{oneGear + "accuracy = true\n", "5:12", []string{"needs a text in quotes"}},
	}
}

// badService are wrong words about a mesh in service, or too few of them.
func badService() []badJob {
	made := strings.NewReplacer("teeth = 20\n", "teeth = 20\nmaterial = \"4140\"\n", "teeth = 30\n", "teeth = 30\nmaterial = { expansion = 20.5 }\n").Replace(onePair) + "housing = \"6061-T6\"\n"
	return []badJob{
		{made + "temperature = \"hot\"\n", "13:15", []string{`temperature: "hot" is not a temperature`, "40..140 F"}},
		{made + "temperature = \"5-60\"\n", "13:15", []string{"two points: 5..60"}},
		{made + "temperature = \"60..5\"\n", "13:15", []string{"runs backwards"}},
		{made + "temperature = \"40F..140\"\n", "13:15", []string{"unit in the middle", "at the end"}},
		{made + "temperature = 400\n", "13:15", []string{"-60 to 200 °C", "-76 to 392 °F"}},
		{made + "temperature = \"-80..20\"\n", "13:15", []string{"-60 to 200 °C"}},
		{made + "temperature = [5, 60]\n", "13:1", []string{"temperature: needs a temperature or a range", "not a list"}},
		{onePair + "temperature = \"5..60\"\n", "10:15", []string{"other than 20 °C", "give material in [gear.a] and [gear.b], and housing in [[mesh]]"}},
		{strings.Replace(made, "housing = \"6061-T6\"\n", "", 1) + "temperature = 60\n", "12:15", []string{"grow: give housing in [[mesh]]\n"}},
		{strings.Replace(made, "material = \"4140\"\n", "", 1) + "temperature = 60\n", "12:15", []string{"grow: give material in [gear.a]\n"}},
		{strings.Replace(made, "4140", "41400", 1) + "temperature = 60\n", "6:12", []string{`material: no material is called "41400"`, `nearest is "4140"`, "tables materials", "expansion = …"}},
		{strings.Replace(made, "6061-T6", "6061-T7", 1) + "temperature = 60\n", "12:11", []string{`housing: no material is called "6061-T7"`, `nearest is "6061-T6"`}},
		{onePair + "housing = 23.6\n", "10:11", []string{"housing: needs a name from the tables", "not a number"}},
		{onePair + "budget = \"best\"\n", "10:10", []string{`"best" is not one of "worst", "statistical"`}},
		{onePair + "thin_share = \"by strength\"\n", "10:14", []string{"give backlash too"}},
	}
}

// resolved works out a job's text.
func resolved(t *testing.T, text string) *job {
	t.Helper()
	r, err := parseJob([]byte(text), "job.toml")
	if err != nil {
		t.Fatal(err)
	}
	j, err := resolve(r)
	if err != nil {
		t.Fatal(err)
	}
	return j
}

// What a job says of its gears and their service arrives as numbers.
func TestConditionsAreRead(t *testing.T) {
	j := resolved(t, `units = "in"
[tooth]
dp = 16
material = "4140"
accuracy = "ISO 1328-1:2013 class 8"
[gear.steel]
teeth = 18
shift = 0.25
thin_tolerance = 0.001
runout = 0.002
[gear.own]
teeth = 45
shift = 0.278
thin = 0.001
material = { name = "brass bar", expansion = 20.5 }
swell = 0.6
[gear.word]
teeth = 45
material = "red plastic"
swell = "0.1..0.6 %"
[[mesh]]
gears = ["steel", "own"]
center = 2
backlash = 0.005
thin_share = "by strength"
budget = "statistical"
temperature = "68..140 F"
housing = "6061"
[[mesh]]
gears = ["own", "word"]
center = 2.9
temperature = 20
`)
	steel, own, word := j.gears[0], j.gears[1], j.gears[2]
	if m := steel.material; m.name != "4140" || m.expansion != 12.3e-6 || m.source == "" || word.material.name != "red plastic" || word.material.known() {
		t.Errorf("steel is %v, word %v", *m, *word.material)
	}
	if m := own.material; *m != (material{name: "brass bar", expansion: 20.5e-6, source: "the job"}) {
		t.Errorf("own is %v", *m)
	}
	if steel.runout == nil || math.Abs(*steel.runout-0.0508) > 1e-15 || steel.thinTolerance == nil || math.Abs(*steel.thinTolerance-0.0254) > 1e-15 || own.runout != nil {
		t.Errorf("runout %v, tolerance %v", steel.runout, steel.thinTolerance)
	}
	if own.swell != (inspect.Limits{Min: 0, Max: 0.006}) || word.swell != (inspect.Limits{Min: 0.001, Max: 0.006}) || steel.swell.Max != 0 {
		t.Errorf("swell %v and %v", own.swell, word.swell)
	}
	if steel.accuracyText != "ISO 1328-1:2013 class 8" || own.accuracyText != steel.accuracyText {
		t.Errorf("accuracy %q and %q", steel.accuracyText, own.accuracyText)
	}
	m := j.meshes[0]
	if !m.plan.LeastOnly || m.plan.Share != inspect.ShareByTeeth || m.plan.Method != inspect.Statistical || m.plan.Backlash.Min != m.plan.Backlash.Max || math.Abs(m.plan.Backlash.Min-0.127) > 1e-15 {
		t.Errorf("%+v, backlash %v", m, m.plan.Backlash)
	}
	if m.temperature == nil || *m.temperature != (inspect.Limits{Min: 20, Max: 60}) || m.housing.name != "6061" || m.housing.expansion != 23.6e-6 {
		t.Errorf("%v in %v", m.temperature, m.housing)
	}
	if m := j.meshes[1]; m.temperature == nil || m.temperature.Max != 20 || m.housing != nil || m.plan.LeastOnly || m.plan.Method == inspect.Statistical || m.plan.Share == inspect.ShareByTeeth {
		t.Errorf("the other mesh: %+v", m)
	}
}

// A range of one value is a range, and what stands at 20 °C needs no materials.
func TestBacklashOfARange(t *testing.T) {
	j := resolved(t, onePair+"center = 50.3\nbacklash = \"0.3..0.3\"\ntemperature = \"68F\"\n")
	if j.meshes[0].plan.LeastOnly {
		t.Error("0.3..0.3 is taken for the least alone")
	}
}
