package main

import (
	"encoding/json"
	"io"
	"os/exec"
	"slices"
	"strings"
	"testing"
)

type goPackage struct {
	ImportPath string
	Imports    []string
}

// Imports run one way: cmd → export → inspect → involute, with refdata at the
// bottom importing nothing of ours.
func TestImportsRunOneWay(t *testing.T) {
	const house = "flankwright/"
	mayImport := map[string][]string{ // rooms that a room may import, besides its own
		"cmd": {"export", "inspect", "involute", "refdata"}, "export": {"inspect", "involute", "refdata"},
		"inspect": {"involute", "refdata"}, "involute": {}, "refdata": {},
	}
	// involute's sub-packages may look numbers up in tables; involute itself may not.
	onlyIn := map[string]string{"github.com/urfave/cli": "cmd", "github.com/tdewolff/canvas": "export", "codeberg.org/go-fonts": "export", "github.com/pelletier/go-toml": "cmd"}
	seen := map[string]bool{}
	for _, p := range listPackages(t, house+"...") {
		room, isOurs := strings.CutPrefix(p.ImportPath, house)
		if !isOurs {
			t.Errorf("package %s lies outside the rooms", p.ImportPath)
			continue
		}
		room, sub, _ := strings.Cut(room, "/")
		allowed, known := mayImport[room]
		if !known {
			t.Errorf("package %s lies in no room of the house", p.ImportPath)
		}
		seen[room] = true
		if room == "involute" && sub != "" {
			allowed = []string{"refdata"}
		}
		for _, imp := range p.Imports {
			if other, ours := strings.CutPrefix(imp, house); ours {
				other, _, _ = strings.Cut(other, "/")
				if other != room && !slices.Contains(allowed, other) {
					t.Errorf("%s imports %s", p.ImportPath, imp)
				}
			}
			for lib, home := range onlyIn {
				if strings.HasPrefix(imp, lib) && room != home {
					t.Errorf("%s imports %s, which only %s may", p.ImportPath, imp, home)
				}
			}
		}
	}
	for room := range mayImport {
		if !seen[room] {
			t.Errorf("room %s holds no package", room)
		}
	}
}

// involute is pure mathematics: nothing outside the standard library, no files, no network.
func TestInvoluteIsPure(t *testing.T) {
	for _, p := range listPackages(t, "flankwright/involute") {
		for _, d := range p.Imports {
			if first, _, _ := strings.Cut(d, "/"); strings.Contains(first, ".") && !strings.HasPrefix(d, "gonum.org/") {
				t.Errorf("involute imports %s", d)
			}
			if d == "os" || d == "io" || strings.HasPrefix(d, "net") || strings.HasPrefix(d, "io/") {
				t.Errorf("involute imports %s", d)
			}
		}
	}
}

func listPackages(t *testing.T, pattern string) []goPackage {
	t.Helper()
	out, err := exec.Command("go", "list", "-json=ImportPath,Imports", pattern).Output()
	if err != nil {
		t.Fatalf("go list: %v", err)
	}
	var list []goPackage
	d := json.NewDecoder(strings.NewReader(string(out)))
	for {
		var p goPackage
		if err := d.Decode(&p); err == io.EOF {
			break
		} else if err != nil {
			t.Fatal(err)
		}
		list = append(list, p)
	}
	if len(list) == 0 {
		t.Fatalf("go list %s names no package", pattern)
	}
	return list
}
