package export

import (
	"strings"
	"testing"

	"flankwright/inspect"
)

// CheckDXF finds each of these damages. The first five are ones that a general
// library's audit lets pass.
func TestCheckDXFFindsDamage(t *testing.T) {
	r2000 := string(dxfBytes(t, cam(inspect.Millimeter), FormatDXF))
	r12 := string(dxfBytes(t, cam(inspect.Millimeter), FormatDXFR12))
	for _, test := range []struct{ name, file, old, new, want string }{
		{"vertex count", r2000, " 90\r\n7\r\n", " 90\r\n8\r\n", "group 90 says 8 vertices, there are 7"},
		{"undefined layer", r2000, "  8\r\nBORE\r\n", "  8\r\nDRILL\r\n", `layer "DRILL" is not defined`},
		{"undefined layer, R12", r12, "  8\r\nBORE\r\n", "  8\r\nDRILL\r\n", `layer "DRILL" is not defined`},
		{"low seed", r2000, "$HANDSEED\r\n  5\r\n45\r\n", "$HANDSEED\r\n  5\r\n44\r\n", `handle 44 is not below $HANDSEED "44"`},
		{"NaN", r2000, " 42\r\n0.414213562373\r\n", " 42\r\nnan\r\n", `"nan" is not a finite number`},
		{"no seed", r2000, "$HANDSEED", "$HANDSOME", "is not below $HANDSEED"},
		{"doubled handle", r2000, "  5\r\n41\r\n", "  5\r\n40\r\n", "handle 40 is used in line"},
		{"no handle", r2000, "  5\r\n41\r\n", "  6\r\nDASHED\r\n", "LWPOLYLINE has no handle"},
		{"odd handle", r2000, "  5\r\n41\r\n", "  5\r\nXY\r\n", `"XY" is not a handle`},
		{"owner", r2000, "330\r\n1F\r\n", "330\r\n77\r\n", `handle "77" in group 330 does not exist`},
		{"no owner", r2000, "CIRCLE\r\n  5\r\n42\r\n330\r\n1F\r\n", "CIRCLE\r\n  5\r\n42\r\n", "CIRCLE has no owner"},
		{"line type", r2000, "  6\r\nDASHED\r\n", "  6\r\nDOTTED\r\n", `line type "DOTTED" is not defined`},
		{"line type, R12", r12, "  6\r\nDASHED\r\n", "  6\r\nDOTTED\r\n", `line type "DOTTED" is not defined`},
		{"doubled layer", r2000, "  2\r\nBORE\r\n", "  2\r\nCUT\r\n", "LAYER CUT for the second time"},
		{"table count", r12, "LAYER\r\n 70\r\n4\r\n", "LAYER\r\n 70\r\n5\r\n", "the table says 5 records and has 4"},
		{"open", r2000, " 90\r\n7\r\n 70\r\n1\r\n", " 90\r\n7\r\n 70\r\n0\r\n", "LWPOLYLINE is not flagged closed"},
		{"open, R12", r12, " 30\r\n0.000000000000\r\n 70\r\n1\r\n", " 30\r\n0.000000000000\r\n 70\r\n0\r\n", "POLYLINE is not flagged closed"},
		{"lost bulge", r2000, " 42\r\n0.414213562373\r\n", "", "7 vertices, 7 y, 6 bulges"},
		{"lost bulge, R12", r12, " 42\r\n0.414213562373\r\n", "", "VERTEX without one bulge"},
		{"long arc", r2000, " 42\r\n0.414213562373\r\n", " 42\r\n0.5\r\n", "is over 90°"},
		{"clockwise", minimalClockwise, "", "", "contour 1 runs clockwise"},
		{"exponent", r2000, " 40\r\n2.500000000000\r\n", " 40\r\n2.5e0\r\n", "written with an exponent"},
		{"negative zero", r12, " 20\r\n0.000000000000\r\n", " 20\r\n-0.000000000000\r\n", "a negative zero"},
		{"extents", r2000, "$EXTMAX\r\n 10\r\n25.", "$EXTMAX\r\n 10\r\n26.", "$EXTMAX is (26"},
		{"extents, R12", r12, "$EXTMIN\r\n 10\r\n-2", "$EXTMIN\r\n 10\r\n-1", "$EXTMIN is (-1"},
		{"unit", r2000, "$INSUNITS\r\n 70\r\n4", "$INSUNITS\r\n 70\r\n1", `$INSUNITS "1" and $MEASUREMENT "1"`},
		{"version", r2000, "AC1015", "AC1021", `$ACADVER is "AC1021"`},
		{"lost section", r2000, "  0\r\nSECTION\r\n  2\r\nCLASSES\r\n  0\r\nENDSEC\r\n", "", "sections are HEADER TABLES"},
		{"lost ENDSEC", r2000, "  0\r\nENDSEC\r\n", "", "section HEADER has no ENDSEC"},
		{"lost ENDTAB", r12, "  0\r\nENDTAB\r\n", "", "TABLE does not belong here"},
		{"lost EOF", r2000, "  0\r\nEOF\r\n", "", "does not end with EOF"},
		{"shifted by a line", r2000, "  0\r\nSECTION\r\n", "SECTION\r\n", "is not a group code"},
		{"stray line", r12, "  0\r\nCIRCLE\r\n", "  0\r\nLINE\r\n  8\r\nCUT\r\n  0\r\nCIRCLE\r\n", "no place for LINE"},
		{"doubled vertex", r12, " 10\r\n15.000000000000\r\n", " 10\r\n-20.000000000000\r\n", "is 0 mm long"},
	} {
		if test.old != "" && !strings.Contains(test.file, test.old) {
			t.Errorf("%s: %q is not in the file", test.name, test.old)
			continue
		}
		damaged := test.file
		if test.old != "" {
			damaged = strings.Replace(damaged, test.old, test.new, 1)
		}
		if p := strings.Join(CheckDXF([]byte(damaged)), "\n"); !strings.Contains(p, test.want) {
			t.Errorf("%s: %q, want %q", test.name, p, test.want)
		}
	}
}

var minimalClockwise = minimal(4, "0\nLWPOLYLINE\n90\n3\n70\n1\n10\n0\n20\n0\n10\n0\n20\n1\n10\n1\n20\n0\n")
