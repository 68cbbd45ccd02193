package export

import (
	"bytes"
	"errors"
	"regexp"
	"strings"
	"testing"

	"flankwright/inspect"
	"pgregory.net/rapid"
)

// dxfBytes writes an outline to memory.
func dxfBytes(t interface{ Fatal(...any) }, o Outline, v Format) []byte {
	var b bytes.Buffer
	if err := writeDXF(&b, o, v); err != nil {
		t.Fatal(err)
	}
	return b.Bytes()
}

func TestDXFGolden(t *testing.T) {
	for name, data := range map[string][]byte{
		"cam_mm_r2000.dxf": dxfBytes(t, cam(inspect.Millimeter), FormatDXF),
		"cam_mm_r12.dxf":   dxfBytes(t, cam(inspect.Millimeter), FormatDXFR12),
		"cam_in_r2000.dxf": dxfBytes(t, cam(inspect.Inch), FormatDXF),
		"cam_in_r12.dxf":   dxfBytes(t, cam(inspect.Inch), FormatDXFR12),
	} {
		golden(t, name, data)
		if p := CheckDXF(data); len(p) > 0 {
			t.Errorf("%s: %s", name, strings.Join(p, "\n"))
		}
	}
}

// The form CAM needs: lengths with twelve decimals, no exponent, no −0, CR LF.
func TestDXFForm(t *testing.T) {
	o := cam(inspect.Inch)
	o.Contours[0].Path.Vertices[0].P.X = -1e-14
	for _, v := range []Format{FormatDXF, FormatDXFR12} {
		text := string(dxfBytes(t, o, v))
		lines := strings.Split(text, "\r\n")
		if strings.Count(text, "\n") != len(lines)-1 || lines[len(lines)-1] != "" {
			t.Errorf("%v: not all lines end in CR LF", v)
		}
		decimals := regexp.MustCompile(`^-?\d+\.\d{12}$`)
		for i := 0; i+1 < len(lines); i += 2 {
			code := strings.TrimSpace(lines[i])
			value := lines[i+1]
			if len(code) == 2 && strings.Contains("10 20 30 40 42 49", code) && !decimals.MatchString(value) {
				t.Errorf("%v line %d: group %s is %q", v, i+2, code, value)
			}
			if strings.HasPrefix(value, "-") && strings.Trim(value, "-0.") == "" {
				t.Errorf("%v line %d: negative zero", v, i+2)
			}
		}
	}
}

func TestDXFRoundTrip(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		o := drawOutline(t)
		o.Title = rapid.StringMatching(`[ -~°é±Ø]{0,20}`).Draw(t, "title")
		v := rapid.SampledFrom([]Format{FormatDXF, FormatDXFR12}).Draw(t, "version")
		data := dxfBytes(t, o, v)
		got, err := readDXF(bytes.NewReader(data))
		if err != nil {
			t.Fatal(err)
		}
		sameOutline(t, got, o, nil)
		if want := strings.TrimSpace(o.Title); got.Title != want || len(got.Skipped) > 0 {
			t.Fatalf("title %q, want %q; skipped %v", got.Title, want, got.Skipped)
		}
		if p := CheckDXF(data); len(p) > 0 {
			t.Fatal(strings.Join(p, "\n"))
		}
		if o.Unit != inspect.Millimeter {
			return
		}
		_, first, _ := bytes.Cut(data, []byte("ENTITIES"))
		_, again, _ := bytes.Cut(dxfBytes(t, got, v), []byte("ENTITIES"))
		if !bytes.Equal(first, again) {
			t.Fatal("what was read is not written as it was")
		}
	})
}

// Any closed path, clockwise and with arcs of up to 350°, becomes a clean file.
func TestDXFOfAnyPath(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		o := Outline{Contours: []Contour{{LayerCut, drawPath(t, 20)}}}
		if o.check() != nil {
			t.Skip("beyond 100 m")
		}
		if p := CheckDXF(dxfBytes(t, o, rapid.SampledFrom([]Format{FormatDXF, FormatDXFR12}).Draw(t, "version"))); len(p) > 0 {
			t.Fatal(strings.Join(p, "\n"))
		}
	})
}

func TestParseDXFVersion(t *testing.T) {
	for _, v := range []Format{FormatDXF, FormatDXFR12} {
		if got, err := ParseDXFVersion(strings.ToUpper(v.String())); got != v || err != nil {
			t.Errorf("%v: %v, %v", v, got, err)
		}
	}
	if _, err := ParseDXFVersion("r14"); err == nil || !strings.Contains(err.Error(), "r2000 or r12 would be right") {
		t.Errorf("r14: %v", err)
	}
}

func TestDXFTitle(t *testing.T) {
	for _, title := range []string{"", "plain", "25° ± Ø α", `back\slash ^ \U+0041`, "😀 beyond the plane"} {
		o := cam(inspect.Millimeter)
		o.Title = title
		got, err := readDXF(bytes.NewReader(dxfBytes(t, o, FormatDXFR12)))
		if err != nil || got.Title != title {
			t.Errorf("%q: %q, %v", title, got.Title, err)
		}
	}
	o := cam(inspect.Millimeter)
	o.Title = "two\r\n  0\r\nlines" + strings.Repeat("°", 500)
	data := dxfBytes(t, o, FormatDXF)
	if got, err := readDXF(bytes.NewReader(data)); err != nil || !strings.HasPrefix(got.Title, "two    0  lines°°") || len(CheckDXF(data)) > 0 {
		t.Errorf("a title of two lines: %q, %v", got.Title, err)
	}
}

// A full disk is reported, not swallowed.
func TestWritersReportErrors(t *testing.T) {
	full := errors.New("disk full")
	for room := range 40 {
		if err := writeDXF(&limitedWriter{100 * room, full}, cam(inspect.Millimeter), FormatDXF); !errors.Is(err, full) {
			t.Fatalf("writeDXF with %d bytes of room: %v", 100*room, err)
		}
	}
	for room := range 15 {
		if err := writeSVG(&limitedWriter{100 * room, full}, cam(inspect.Millimeter)); !errors.Is(err, full) {
			t.Fatalf("writeSVG with %d bytes of room: %v", 100*room, err)
		}
	}
}

// A limitedWriter fails once it has no room left.
type limitedWriter struct {
	room int
	err  error
}

func (w *limitedWriter) Write(p []byte) (int, error) {
	if len(p) > w.room {
		return w.room, w.err
	}
	w.room -= len(p)
	return len(p), nil
}
