package export

import (
	"bytes"
	"encoding/json"
	"fmt"
	"html"
	"math"
	"os"
	"path/filepath"
	"testing"

	"flankwright/involute"
)

// dumpDOM loads a page in a browser without a window and returns the page as it
// stands after its scripts, given five seconds of the page's own time.
func dumpDOM(t *testing.T, page []byte) []byte {
	t.Helper()
	browser := outsideProgram(t, "chromium", "chromium")
	dir := t.TempDir()
	path := filepath.Join(dir, "page.html")
	if err := os.WriteFile(path, page, 0o644); err != nil {
		t.Fatal(err)
	}
	return outsideRun(t, browser, "--headless", "--no-sandbox", "--disable-gpu", "--user-data-dir="+filepath.Join(dir, "profile"),
		"--virtual-time-budget=5000", "--dump-dom", "file://"+path)
}

// rollingProbe stops the picture at several times and writes down how the gears
// are turned (by the matrices the browser draws with), and where the dots are that it shows.
const rollingProbe = `<pre id="out"></pre><script>
// The picture's clock starts only after the page has been loaded.
window.onload = function () { setTimeout(probe, 100); };
function probe() {
  var svg = document.querySelector("svg"), out = [];
  svg.pauseAnimations();
  %s.forEach(function (at) {
    svg.setCurrentTime(at);
    var turn = function (id) {
      var g = document.getElementById(id), own = g.parentNode.getScreenCTM().inverse().multiply(g.getScreenCTM());
      return Math.atan2(own.b, own.a);
    };
    var dots = Array.from(document.querySelectorAll("#contacts circle")).filter(function (c) {
      return getComputedStyle(c).opacity === "1";
    }).map(function (c) { return [c.cx.animVal.value, c.cy.animVal.value]; });
    out.push({first: turn("first"), second: turn("second"), dots: dots});
  });
  document.getElementById("out").textContent = JSON.stringify(out);
}
</script>`

// A browser plays the picture as it is meant: turns and dots are those that the
// attributes say by the rules of SMIL, at times before and after a loop's end.
func TestBrowserRolls(t *testing.T) {
	s, _ := drawnMeshes()[1].make(t, 0.005)
	data, err := RollingSVG(s)
	if err != nil {
		t.Fatal(err)
	}
	times := []float64{0, 0.6, 1.7, 2.5, 3.9, 4.99, 5.01, 8.3}
	list, _ := json.Marshal(times)
	_, svg, _ := bytes.Cut(data, []byte("?>"))
	page := fmt.Sprintf("<!DOCTYPE html><html><body>%s%s</body></html>", svg, fmt.Sprintf(rollingProbe, list))
	dom := dumpDOM(t, []byte(page))
	_, rest, _ := bytes.Cut(dom, []byte(`<pre id="out">`))
	text, _, _ := bytes.Cut(rest, []byte("</pre>"))
	var got []struct {
		First, Second float64
		Dots          [][2]float64
	}
	if err := json.Unmarshal([]byte(html.UnescapeString(string(text))), &got); err != nil || len(got) != len(times) {
		t.Fatalf("the browser wrote %q: %v", text, err)
	}
	const slack = 1e-4 // browsers reckon in single precision
	f := newFilm(t, data)
	for i, at := range times {
		tau := math.Mod(at/rollingSeconds, 1)
		turn1, turn2 := f.turns(t, tau)
		if !near(slack, got[i].First, -turn1, got[i].Second, -turn2) {
			t.Errorf("at %g s: turned by %.6f and %.6f, want %.6f and %.6f", at, got[i].First, got[i].Second, -turn1, -turn2)
		}
		dots := f.dots(t, tau)
		if len(dots) != len(got[i].Dots) {
			t.Errorf("at %g s: %d dots, want %d", at, len(got[i].Dots), len(dots))
			continue
		}
		for j, q := range dots {
			if d := q.Sub(involute.Vec{X: got[i].Dots[j][0], Y: -got[i].Dots[j][1]}).Norm(); d > slack {
				t.Errorf("at %g s: dot %d is %g mm off", at, j, d)
			}
		}
	}
}
