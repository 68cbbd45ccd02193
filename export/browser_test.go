package export

import (
	"encoding/json"
	"html"
	"os"
	"os/exec"
	"regexp"
	"strings"
	"testing"
)

// browserPage shows SVG documents one below the other. They are parsed as XML, as a
// browser parses a file, so that what is not well formed is an error; nothing is
// fetched from anywhere, and scripts within them do not run.
const browserPage = `<!DOCTYPE html>
<html><head><meta charset="utf-8">
<meta http-equiv="Content-Security-Policy" content="default-src 'none'; script-src 'unsafe-inline'; style-src 'unsafe-inline'; img-src data:; font-src data:">
<style>body { margin: 0 } svg { display: block }</style></head>
<body><pre id="answer"></pre><script>
addEventListener("load", () => setTimeout(() => { // a document that is added once the page is loaded starts at once
  const answer = {}
  try {
    const svgs = SOURCES.map(text => {
      const page = new DOMParser().parseFromString(text, "image/svg+xml")
      const wrong = page.querySelector("parsererror")
      if (wrong) throw new Error(wrong.textContent)
      return document.body.insertBefore(document.importNode(page.documentElement, true), document.getElementById("answer"))
    })
    const svg = svgs[0]
    answer.value = (() => {
SCRIPT
})()
  } catch (e) {
    answer.error = String(e)
  }
  document.getElementById("answer").textContent = JSON.stringify(answer)
}))
</script></body></html>
`

// browse shows SVG documents in a real browser, runs a script beside them and
// decodes what it returns into out, as JSON. In the script, a function's body,
// svg is the first document's element and svgs is the list of all. A pixel is
// 1/96 inch.
//
// The browser's clock is its own and runs on as fast as the page lets it.
// Animations stand still where the script puts them. (A time that is set before
// the page is loaded is lost as the clock starts; so the documents are added, and the
// script is run, only after that.)
//
//	svg.pauseAnimations(); svg.setCurrentTime(2.5)
//	const m = svg.getElementById("driver").getCTM()
//	return [m.a, m.b, m.c, m.d, m.e, m.f]
func browse(t *testing.T, out any, script string, svgs ...[]byte) {
	t.Helper()
	browser := outsideProgram(t, "chromium", "chromium")
	var texts []string
	for _, s := range svgs {
		texts = append(texts, string(s))
	}
	sources, err := json.Marshal(texts) // escapes <, so that nothing ends the script
	if err != nil {
		t.Fatal(err)
	}
	// Not t.TempDir: a browser's last process may still write its profile as the test ends.
	dir, err := os.MkdirTemp("", "browse")
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { os.RemoveAll(dir) })
	page := strings.NewReplacer("SOURCES", string(sources), "SCRIPT", script).Replace(browserPage)
	if err := os.WriteFile(dir+"/page.html", []byte(page), 0o644); err != nil {
		t.Fatal(err)
	}
	cmd := exec.Command(browser, "--headless", "--no-sandbox", "--disable-gpu", "--disable-dev-shm-usage", "--no-first-run",
		"--disable-background-networking", "--disable-component-update", "--disable-sync", "--host-resolver-rules=MAP * ~NOTFOUND",
		"--force-device-scale-factor=1", "--window-size=1200,900", "--user-data-dir="+dir+"/profile", "--virtual-time-budget=10000", "--dump-dom", "file://"+dir+"/page.html")
	cmd.Env = append(os.Environ(), "HOME="+dir, "XDG_CONFIG_HOME="+dir, "XDG_CACHE_HOME="+dir)
	var errors strings.Builder
	cmd.Stderr = &errors
	dom, err := cmd.Output()
	if err != nil {
		t.Fatalf("%v\n%s", err, errors.String())
	}
	m := regexp.MustCompile(`(?s)<pre id="answer">(.*?)</pre>`).FindSubmatch(dom)
	if m == nil {
		t.Fatalf("the browser shows no answer:\n%.2000s\n%s", dom, errors.String())
	}
	var answer struct {
		Value json.RawMessage
		Error string
	}
	text := html.UnescapeString(string(m[1]))
	if err := json.Unmarshal([]byte(text), &answer); err != nil || answer.Error != "" {
		t.Fatalf("the browser's answer: %s, %v\n%.2000s", answer.Error, err, text)
	}
	if err := json.Unmarshal(answer.Value, out); err != nil {
		t.Fatalf("%v in %.2000s", err, answer.Value)
	}
}
