package main

import (
	"bytes"
	"image/png"
	"math"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"
)

// The README's walk is what the program prints: every console block that begins
// with "$ flankwright" is run again, in a folder that holds the job it starts
// from. With -update the README and its picture are refreshed.
func TestReadmeIsTrue(t *testing.T) {
	path, err := filepath.Abs("../../README.md")
	if err != nil {
		t.Fatal(err)
	}
	picture := filepath.Join(filepath.Dir(path), ".pictures", "sheet.png")
	data, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	t.Chdir(t.TempDir())
	mustRun(t, "new", "-o", "drive.toml")

	blocks := 0
	block := regexp.MustCompile("(?s)```console\n\\$ flankwright ([^\n]*)\n(.*?)```\n")
	fresh := block.ReplaceAllStringFunc(string(data), func(old string) string {
		blocks++
		command := block.FindStringSubmatch(old)[1]
		out := mustRun(t, strings.Fields(command)...)
		return "```console\n$ flankwright " + command + "\n" + strings.TrimRight(out, "\n") + "\n```\n"
	})
	if blocks < 3 {
		t.Errorf("%d console blocks found, the walk has more", blocks)
	}
	mustRun(t, "sheet", "drive.toml", "--gear", "driver", "-o", "sheet.png")
	shown, err := os.ReadFile("sheet.png")
	if err != nil {
		t.Fatal(err)
	}
	if *update {
		write(t, path, []byte(fresh))
		write(t, picture, shown)
		return
	}
	if fresh != string(data) {
		t.Errorf("the README shows other output than the program prints; go test ./cmd/flankwright -run Readme -update refreshes it")
	}
	old, err := os.ReadFile(picture)
	if err != nil {
		t.Fatal(err)
	}
	if d := unlike(t, old, shown); d > samePicture {
		t.Errorf("the README's picture is not the sheet that the program makes: %.4f of full scale apart; -update refreshes it", d)
	}
}

// samePicture is how far two pictures of one sheet may be apart on average:
// processors that fuse multiply and add shade some edge pixels otherwise. A
// moved line of text comes to ten times as much.
const samePicture = 0.0005

// unlike returns the mean difference of two PNGs, as a share of full scale.
func unlike(t *testing.T, a, b []byte) float64 {
	t.Helper()
	p, err1 := png.Decode(bytes.NewReader(a))
	q, err2 := png.Decode(bytes.NewReader(b))
	if err1 != nil || err2 != nil {
		t.Fatal(err1, err2)
	}
	if p.Bounds() != q.Bounds() {
		return 1
	}
	sum, n := 0.0, 0
	for y := p.Bounds().Min.Y; y < p.Bounds().Max.Y; y++ {
		for x := p.Bounds().Min.X; x < p.Bounds().Max.X; x++ {
			r1, _, _, _ := p.At(x, y).RGBA()
			r2, _, _, _ := q.At(x, y).RGBA()
			sum += math.Abs(float64(r1) - float64(r2))
			n++
		}
	}
	return sum / float64(n) / 0xffff
}

func mustRun(t *testing.T, args ...string) string {
	t.Helper()
	var out, errs bytes.Buffer
	if status := run(args, strings.NewReader(""), &out, &errs); status != exitDone {
		t.Fatalf("flankwright %s: status %d, %s", strings.Join(args, " "), status, errs.String())
	}
	return out.String()
}

func write(t *testing.T, path string, data []byte) {
	t.Helper()
	if err := os.WriteFile(path, data, 0o644); err != nil {
		t.Fatal(err)
	}
}
