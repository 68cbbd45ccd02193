package main

import (
	"strings"
	"testing"
)

// A shopMistake is a shop file with a mistake, where it is said to be, and some of what is said.
type shopMistake struct{ text, where, want string }

const mmShop = "units = \"mm\"\n"

func pinMistakes() []shopMistake {
	return []shopMistake{
		{"", "1:1", "units is missing"},
		{"units = \"cm\"", "1:9", "is not one of \"mm\", \"in\""},
		{"units = 3", "1:9", "needs a text in quotes"},
		{mmShop + "title = 7", "2:9", "needs a text"},
		{mmShop + "pins = 3", "2:1", "did you mean pin?"},
		{mmShop + "wires = 3", "2:1", "did you mean pin?"},
		{mmShop + "anvil = 3", "2:1", "belongs in [[micrometer]]"},
		{mmShop + "teeth = 3", "2:1", "belongs in [[form_cutter]]"},
		{mmShop + "face_width = 3", "2:1", "belongs in a job file"},
		{mmShop + "bananas = 3", "2:1", "there are title, units, pin"},
		{mmShop + "pin = 3", "2:1", "each written [[pin]]"},
		{mmShop + "[pin]\nsize = 3", "2:2", "each written [[pin]]"},
		{mmShop + "pin = [3]", "2:1", "each written [[pin]]"},
		{mmShop + "[[pin]]\nsise = 3", "3:1", "did you mean size?"},
		{mmShop + "[[pin]]\ndiameter = 3", "3:1", "did you mean size?"},
		{mmShop + "[[pin]]\nqty = 3", "3:1", "did you mean count?"},
		{mmShop + "[[pin]]\ncount = 2", "2:3", "size is missing"},
		{mmShop + "[[pin]]\nsize = 0", "3:8", "above 0"},
		{mmShop + "[[pin]]\nsize = \"3,5\"", "3:8", "decimals take a point"},
		{mmShop + "[[pin]]\nsize = true", "3:8", "needs a length"},
		{mmShop + "[[pin]]\nsize = 400", "3:8", "is no pin"},
		{mmShop + "[[pin]]\nsize = nan", "3:8", "finite"},
		{mmShop + "[[pin]]\nsize = 3.5\nmeasured = 3.7", "4:12", "is not a pin of 3.5000 mm"},
		{mmShop + "[[pin]]\nsize = 0.5\nmeasured = 0.55", "4:12", "is not a pin of"},
		{mmShop + "[[pin]]\nsize = 3.5\nmeasured = [3.5, \"x\"]", "4:18", "is not a length"},
		{mmShop + "[[pin]]\nsize = 3.5\nmeasured = []", "4:1", "one for each"},
		{mmShop + "[[pin]]\nsize = 3.5\nmeasured = [3.5, 3.501]\ncount = 3", "5:9", "measured has 2"},
		{mmShop + "[[pin]]\nsize = 3.5\ncount = 0", "4:9", "whole number"},
		{mmShop + "[[pin]]\nsize = 3.5\ncount = 1.5", "4:9", "whole number"},
		{mmShop + "[[pin]]\nsize = 3.5\ncount = 5000", "4:9", "at most 1000"},
		{mmShop + "[[pin]]\nsize = 3.5\nclass = \"ZZ\"", "4:9", "\"ZZ plus\" or \"ZZ minus\""},
		{mmShop + "[[pin]]\nsize = 3.5\nclass = \"W minus\"", "4:9", "the nearest is"},
		{mmShop + "[[pin]]\nsize = 3.5\nclass = \"DIN 2269 class 3\"", "4:9", "has the classes 0, 1, 2"},
		{mmShop + "[[pin]]\nsize = 3.5\nclass = \"class 1 plus\"", "4:9", "leave plus out"},
		{mmShop + "[[pin]]\nsize = 3.5\nclass = 1", "4:9", "needs a text"},
		{mmShop + "[[pin]]\nsize = 25\nclass = \"class 1\"", "4:9", "from 0.1 to 20 mm"},
		{mmShop + "[[pin]]\nsize = 3.5\nplace = 4", "4:9", "needs a text"},
		{mmShop + "[[pin]]\nfrom = 1\nto = 2", "2:3", "step is missing"},
		{mmShop + "[[pin]]\nfrom = 2\nto = 1\nstep = 0.1", "4:6", "above from"},
		{mmShop + "[[pin]]\nfrom = 1\nto = 2\nstep = 0.3", "5:8", "evenly"},
		{mmShop + "[[pin]]\nfrom = 1\nto = 10\nstep = 0.0001", "5:8", "at most"},
		{mmShop + "[[pin]]\nfrom = 1\nto = 2\nstep = 0.1\nmeasured = 1.5", "6:12", "of a set"},
		{mmShop + "[[pin]]\nfrom = 0.1\nto = 1\nstep = 0.1\nclass = \"ZZ minus\"", "6:9", "for pins over 0.010"},
		{mmShop + "[[ball]]\nradius = 3", "3:1", "no such key in [[ball]]"},
	}
}

func toolMistakes() []shopMistake {
	return []shopMistake{
		{mmShop + "[[micrometer]]\nname = \"x\"", "2:3", "range is missing"},
		{mmShop + "[[micrometer]]\nrange = 25", "3:9", "two ends"},
		{mmShop + "[[micrometer]]\nrange = \"50..25\"", "3:9", "backwards"},
		{mmShop + "[[micrometer]]\nrange = \"25-50\"", "3:9", "write it with two points"},
		{mmShop + "[[micrometer]]\nrange = \"-5..25\"", "3:9", "between 0 and"},
		{mmShop + "[[micrometer]]\nrange = \"0..25\"\naccuracy = 1", "4:1", "did you mean uncertainty?"},
		{mmShop + "[[micrometer]]\nrange = \"0..25\"\nuncertainty = 0", "4:15", "above 0"},
		{mmShop + "[[micrometer]]\nrange = \"0..25\"\nuncertainty = 4", "4:15", "is no measurement"},
		{mmShop + "[[micrometer]]\nrange = \"2000..2025\"", "2:3", "uncertainty is missing"},
		{mmShop + "[[micrometer]]\nrange = \"0..25\"\nanvil = \"point\"", "4:9", "is not one of \"flat\", \"disc\""},
		{mmShop + "[[micrometer]]\nrange = \"0..25\"\nanvil = \"disc\"", "2:3", "anvil_diameter is missing"},
		{mmShop + "[[micrometer]]\nrange = \"0..25\"\nanvil = \"disc\"\nanvil_diameter = 6\nrim = 0.7", "5:18", "larger than the spindle"},
		{mmShop + "[[micrometer]]\nrange = \"0..25\"\nrim = 0.7", "4:7", "is for discs"},
		{mmShop + "[[caliper]]\nrange = \"0..1000\"", "2:3", "uncertainty is missing"},
		{mmShop + "[[caliper]]\nrange = \"0..150\"\ngraduation = 5", "4:14", "at most"},
		{mmShop + "[[caliper]]\nrange = \"0..150\"\njaw = -1", "4:7", "above 0"},
		{mmShop + "[[tooth_caliper]]\nname = \"x\"", "2:3", "give module or dp"},
		{mmShop + "[[tooth_caliper]]\nmodule = 2", "3:10", "range in quotes"},
		{mmShop + "[[tooth_caliper]]\nmodule = \"1in..2in\"", "3:10", "plain numbers"},
		{mmShop + "[[tooth_caliper]]\ndp = \"0..2\"", "3:6", "above 0"},
		{mmShop + "[[tooth_caliper]]\nmodule = \"1..2\"\ndp = \"1..2\"", "4:6", "keep one"},
		{mmShop + "[[end_mill]]\nmeasured = 2", "2:3", "size is missing"},
		{mmShop + "[[end_mill]]\nsize = 2\nmeasured = 1", "4:12", "new or reground"},
		{mmShop + "[[end_mill]]\nsize = 200", "3:8", "is no end mill"},
		{mmShop + "[[form_cutter]]\nmodule = 2", "2:3", "numbers is missing"},
		{mmShop + "[[form_cutter]]\nmodule = 2\nnumbers = [9]", "4:12", "numbered 1 to 8"},
		{mmShop + "[[form_cutter]]\nmodule = 2\nnumbers = [2.3]", "4:12", "numbered 1 to 8"},
		{mmShop + "[[form_cutter]]\nmodule = 2\nnumbers = [\"two\"]", "4:12", "plain number"},
		{mmShop + "[[form_cutter]]\nmodule = 2\nnumbers = 3\nteeth = \"35..54\"", "5:9", "keep one"},
		{mmShop + "[[form_cutter]]\nmodule = 2\nteeth = \"35.5..54\"", "4:9", "whole numbers"},
		{mmShop + "[[form_cutter]]\nmodule = 1e9\nnumbers = 3", "3:10", "must be from"},
		{mmShop + "[[form_cutter]]\nmodule = 2\npressure_angle = 80\nnumbers = 3", "4:18", "from 5° to 45°"},
		{mmShop + "[[hob]]\ndp = 16\nrack = \"nonsense 53\"", "4:8", "nearest"},
		{mmShop + "[[hob]]\ndp = 16\nrack = 5", "4:8", "needs a text"},
		{mmShop + "[[hob]]\ndp = 0", "3:6", "must be from"},
		{mmShop + "[[pin]]\nsize = 3\nsize = 4", "4:1", ""},
		{mmShop + "[[pin]\n", "2:", ""},
	}
}

// Every mistake, with its line and column and what would be right.
func TestShopMistakes(t *testing.T) {
	for _, c := range append(pinMistakes(), toolMistakes()...) {
		_, err := parseShop([]byte(c.text), "shop.toml")
		p, ok := err.(*problem)
		if !ok {
			t.Errorf("%q: %v", c.text, err)
			continue
		}
		if p.status != exitQuestion || !strings.HasPrefix(p.where, "shop.toml:"+c.where) || !strings.Contains(p.text, c.want) {
			t.Errorf("%q:\n  %s: %s\n  want %s: … %s", c.text, p.where, p.text, c.where, c.want)
		}
	}
}
