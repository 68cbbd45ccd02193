package main

import (
	"errors"
	"io/fs"
	"os"
	"path/filepath"

	"github.com/urfave/cli/v2"

	"flankwright/inspect"
)

// A shop is what is on hand, as a shop file lists it.
type shop struct {
	file        string
	title       string
	units       inspect.Unit
	stock       inspect.Stock
	endMills    []endMill
	formCutters []formCutter
	hobs        []hob
}

// An endMill is end mills of one size. Real ones are under size: Diameter is what
// a root is to be computed with.
type endMill struct {
	nominal, diameter float64 // mm; the same where it is not measured
	measured          bool
	count             int
	place             string
}

// A formCutter is a set of disc cutters of one pitch, each for a range of tooth numbers.
type formCutter struct {
	module        float64 // mm
	dp            float64 // as given, 0 where a module was
	pressureAngle float64 // degrees
	numbers       []float64
	teeth         [2]int // least and most, where the set is given by its teeth; 0 for none
	place         string
}

// A hob is a hob, of one pitch and basic rack.
type hob struct {
	module        float64 // normal, mm
	dp            float64 // as given, 0 where a module was
	pressureAngle float64 // degrees
	rack          string  // by the name in the tables; blank where it is not known
	place         string
}

// noShop is the word that stands for no shop file.
const noShop = "none"

// loadShop reads the shop file of a command: the one that --shop names, else
// shop.toml in the user's configuration folder. It is nil where there is none.
func loadShop(c *cli.Context) (*shop, error) {
	path := c.String("shop")
	switch {
	case !c.IsSet("shop"):
		return ownShop()
	case path == noShop:
		return nil, nil
	case path == "" || path == "-":
		return nil, wrong("--shop: needs a file (flankwright new --shop writes one), or %s", noShop)
	}
	return readShop(path)
}

// checkShop says what is wrong with a shop file that was asked for, in commands
// that do not use it too.
func checkShop(c *cli.Context) error {
	if !c.IsSet("shop") {
		return nil
	}
	_, err := loadShop(c)
	return err
}

// ownShop reads the shop file in the user's configuration folder, if there is one.
func ownShop() (*shop, error) {
	folder, err := os.UserConfigDir()
	if err != nil {
		return nil, nil // a machine without such a folder has no file in it
	}
	path := filepath.Join(folder, "flankwright", "shop.toml")
	if _, err := os.Stat(path); errors.Is(err, fs.ErrNotExist) {
		return nil, nil
	}
	return readShop(path)
}

func readShop(path string) (*shop, error) {
	data, name, err := readFile(path, "shop file", "flankwright new --shop writes one")
	if err != nil {
		return nil, err
	}
	return parseShop(data, name)
}

// parseShop reads a shop file. data is TOML; file is its name for messages.
func parseShop(data []byte, file string) (*shop, error) {
	root, err := parseTree(data, file)
	if err != nil {
		return nil, err
	}
	if err := checkShopKeys(root, shopTop, "a shop file"); err != nil {
		return nil, err
	}
	r := shopReader{shop: &shop{file: file}}
	top := settings{vals: map[string]value{}, at: root.at}
	for _, e := range root.entries {
		top.vals[e.key] = e.val
	}
	if err := r.readTop(top); err != nil {
		return nil, err
	}
	for _, kind := range []struct {
		table string
		read  func(settings) error
	}{
		{"pin", func(s settings) error { return r.readPins(s, false) }},
		{"ball", func(s settings) error { return r.readPins(s, true) }},
		{"micrometer", r.readMicrometer}, {"caliper", r.readCaliper}, {"tooth_caliper", r.readToothCaliper},
		{"end_mill", r.readEndMill}, {"form_cutter", r.readFormCutter}, {"hob", r.readHob},
	} {
		if err := r.each(root, kind.table, kind.read); err != nil {
			return nil, err
		}
	}
	return r.shop, nil
}
