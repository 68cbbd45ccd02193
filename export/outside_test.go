package export

import (
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"
)

// outsideMissing skips a test whose outside program is missing; where the
// environment variable FLANKWRIGHT_REQUIRE_OUTSIDE is set, it fails.
func outsideMissing(t *testing.T, what, debian string) {
	t.Helper()
	if os.Getenv("FLANKWRIGHT_REQUIRE_OUTSIDE") != "" {
		t.Fatalf("%s is missing (Debian package %s) and FLANKWRIGHT_REQUIRE_OUTSIDE is set", what, debian)
	}
	t.Skipf("%s is missing; install the Debian package %s to run this check", what, debian)
}

// outsideProgram returns the path of a program of a Debian package.
func outsideProgram(t *testing.T, name, debian string) string {
	t.Helper()
	path, err := exec.LookPath(name)
	if err != nil {
		outsideMissing(t, "program "+name, debian)
	}
	return path
}

// outsidePython returns a Python that has a module of a Debian package. The
// system's own Python goes first: another one on the path does not see Debian's modules.
func outsidePython(t *testing.T, module, debian string) string {
	t.Helper()
	for _, name := range []string{"/usr/bin/python3", "python3"} {
		path, err := exec.LookPath(name)
		if err == nil && exec.Command(path, "-c", "import "+module).Run() == nil {
			return path
		}
	}
	outsideMissing(t, "Python module "+module, debian)
	return ""
}

// outsideRun runs a program and returns what it prints.
func outsideRun(t *testing.T, name string, args ...string) []byte {
	t.Helper()
	cmd := exec.Command(name, args...)
	var errors strings.Builder
	cmd.Stderr = &errors
	out, err := cmd.Output()
	if err != nil {
		t.Fatalf("%s: %v\n%s%s", filepath.Base(name), err, out, errors.String())
	}
	return out
}
