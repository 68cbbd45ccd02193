package main

import (
	"bytes"
	"encoding/json"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"path/filepath"
	"strings"
	"unicode/utf8"

	"github.com/urfave/cli/v2"
)

// version is what --version says.
const version = "0.1.0"

// run is the program: it reads args (without the program's name), writes
// results to stdout and everything else to stderr, and returns the exit status.
func run(args []string, stdin io.Reader, stdout, stderr io.Writer) int {
	app := newApp(stdin, stdout, stderr)
	err := app.Run(append([]string{"flankwright"}, reorder(app, args)...))
	return report(err, asksJSON(args), stderr)
}

func newApp(stdin io.Reader, stdout, stderr io.Writer) *cli.App {
	app := &cli.App{
		Name:      "flankwright",
		Usage:     "gears for small shops: dimensions, what to measure, contour and inspection sheet",
		UsageText: "flankwright COMMAND [JOB] [flags]\n\nJOB is a job file (TOML), - for standard input, or left out for flags alone.",
		Version:   version,
		Reader:    stdin, Writer: stdout, ErrWriter: stderr,
		HideHelpCommand:           true,
		DisableSliceFlagSeparator: true, // --pin 3,5 is a slip, not two pins
		Commands: []*cli.Command{
			newCommand(), dimsCommand(), backlashCommand(), targetsCommand(), contourCommand(),
			sheetCommand(), packetCommand(), tablesCommand(),
		},
		ExitErrHandler: func(*cli.Context, error) {},
		OnUsageError:   usageError,
		Suggest:        false,
		Action:         noCommand,
	}
	for _, c := range app.Commands {
		c.OnUsageError = usageError
	}
	return app
}

// usageError keeps the flag parser's complaint and words it as one of ours.
func usageError(c *cli.Context, err error, _ bool) error {
	text := err.Error()
	if name, ok := strings.CutPrefix(text, "flag provided but not defined: "); ok {
		return unknownFlag(c, strings.TrimLeft(name, "-"))
	}
	if name, ok := strings.CutPrefix(text, "flag needs an argument: "); ok {
		return wrong("--%s: needs a value", strings.TrimLeft(name, "-"))
	}
	var given, name string
	if n, _ := fmt.Sscanf(text, "invalid value %q for flag -%s", &given, &name); n == 2 {
		return wrong("--%s: %q is not a whole number", strings.TrimSuffix(name, ":"), given)
	}
	return wrong("%s", text)
}

func unknownFlag(c *cli.Context, name string) error {
	if why, ok := otherDrive(name); ok {
		return wrong("--%s: %s", name, why)
	}
	if key, ok := strings.CutPrefix(name, "mate-"); ok {
		if _, known := findKey(strings.ReplaceAll(key, "-", "_")); known {
			return wrong("--%s: no such flag; write a job file to say %s of both gears (flankwright new)", name, key)
		}
	}
	command := strings.TrimSpace(strings.TrimPrefix(c.Command.Name, "flankwright"))
	if k, ok := findKey(strings.ReplaceAll(name, "-", "_")); ok && command != "" && command != "tables" && command != "new" {
		if k.usage != "" && k.where&atTop != 0 {
			return wrong("--%s: is for the sheet; %s does not use it", name, command)
		}
		return wrong("--%s: no such flag; write %s into a job file, %s", name, k.name, scopeName(k.where))
	}
	var names []string
	for _, f := range c.Command.VisibleFlags() {
		names = append(names, f.Names()[0])
	}
	if near, ok := nearest(name, names); ok {
		return wrong("--%s: no such flag; did you mean --%s?", name, near)
	}
	return wrong("--%s: no such flag; %s lists them", name, strings.Join(strings.Fields("flankwright "+command+" --help"), " "))
}

// plannedCommands are to come, and are refused until then.
func plannedCommands() []string {
	return []string{"size", "reading", "unknown", "cutters", "load", "bore"}
}

// noCommand runs where no command was recognized.
func noCommand(c *cli.Context) error {
	name := c.Args().First()
	if name == "" || name == "help" {
		return cli.ShowAppHelp(c)
	}
	if why, ok := otherDrive(name); ok {
		return wrong("%s: %s", name, why)
	}
	var names []string
	for _, cmd := range c.App.Commands {
		names = append(names, cmd.Name)
	}
	for _, p := range plannedCommands() {
		if p == name {
			return wrong("%s: not supported yet; there are %s", name, strings.Join(names, ", "))
		}
	}
	if near, ok := nearest(name, names); ok {
		return wrong("%s: no such command; did you mean %s?", name, near)
	}
	return wrong("%s: no such command; there are %s", name, strings.Join(names, ", "))
}

// reorder puts a command's flags before its operands, which the flag parser wants.
// What follows -- stays as it is.
func reorder(app *cli.App, args []string) []string {
	at := 0
	for at < len(args) && strings.HasPrefix(args[at], "-") && args[at] != "-" {
		at++
	}
	if at == len(args) {
		return args
	}
	cmd := app.Command(args[at])
	if cmd == nil {
		return args
	}
	takes := valueFlags(cmd)
	var flags, operands []string
	rest := args[at+1:]
	for i := 0; i < len(rest); i++ {
		a := rest[i]
		switch {
		case a == "--":
			operands = append(operands, rest[i+1:]...)
			i = len(rest)
		case !strings.HasPrefix(a, "-") || a == "-":
			operands = append(operands, a)
		default:
			flags = append(flags, a)
			if !takes[strings.TrimLeft(a, "-")] {
				continue
			}
			if i+1 == len(rest) {
				return append(append([]string{}, args[:at+1]...), flags...) // its value is missing: the parser says so
			}
			i++
			flags = append(flags, rest[i])
		}
	}
	out := append([]string{}, args[:at+1]...)
	out = append(append(out, flags...), "--")
	return append(out, operands...)
}

// valueFlags returns the names of a command's flags that take a value.
func valueFlags(cmd *cli.Command) map[string]bool {
	takes := map[string]bool{}
	for _, f := range cmd.Flags {
		if d, ok := f.(cli.DocGenerationFlag); ok && d.TakesValue() {
			for _, n := range f.Names() {
				takes[n] = true
			}
		}
	}
	return takes
}

// asksJSON reports whether errors are to be JSON too.
func asksJSON(args []string) bool {
	for _, a := range args {
		if a == "--" {
			return false
		}
		if a == "--json" || a == "-json" || a == "--json=true" {
			return true
		}
	}
	return false
}

// report prints an error and returns the exit status it stands for.
func report(err error, asJSON bool, stderr io.Writer) int {
	if err == nil {
		return exitDone
	}
	if errors.Is(err, errNo) {
		return exitNo
	}
	p := &problem{status: exitCannot, text: err.Error()}
	errors.As(err, &p)
	if asJSON {
		data, _ := json.Marshal(map[string]any{"error": map[string]any{"where": p.where, "text": p.text, "status": p.status}})
		fmt.Fprintln(stderr, string(data))
	} else {
		fmt.Fprintln(stderr, "flankwright: "+p.Error())
	}
	return p.status
}

// maxJob bounds a job file or a shop file; a large one is a mistake.
const maxJob = 1 << 20

// loadRequest reads the request of a command: a file, standard input, an example, or flags.
func loadRequest(c *cli.Context) (request, error) {
	if err := checkShop(c); err != nil {
		return request{}, err
	}
	if c.NArg() > 1 {
		return request{}, wrong("one job at a time: %q is one too many", c.Args().Get(1))
	}
	path, example := c.Args().First(), c.String("example")
	if path != "" && example != "" {
		return request{}, wrong("give a job file or --example, not both")
	}
	if d := c.Int("digits"); c.IsSet("digits") && (d < 0 || d > 9) {
		return request{}, wrong("--digits: %d decimals make no sense; take 0 to 9", d)
	}
	if path == "" && example == "" {
		return requestFromFlags(c)
	}
	data, name, err := readJob(c, path, example)
	if err != nil {
		return request{}, err
	}
	r, err := parseJob(data, name)
	if err != nil {
		return r, err
	}
	return r, r.overrideByFlags(c)
}

func readJob(c *cli.Context, path, example string) (data []byte, name string, err error) {
	if example != "" {
		data, err = exampleJob(example)
		return data, example + ".toml", err
	}
	if path == "-" {
		return readText(c.App.Reader, "standard input", "job file", "flankwright new writes one")
	}
	return readFile(path, "job file", "flankwright new writes one")
}

// readFile reads a TOML file whole; kind says what it should be, hint how to get one.
func readFile(path, kind, hint string) (data []byte, name string, err error) {
	f, err := os.Open(path)
	if err != nil {
		return nil, "", cannot("%v", plainPathError(err))
	}
	defer f.Close()
	if info, err := f.Stat(); err == nil && info.IsDir() {
		return nil, "", cannot("%s: is a folder, not a %s", path, kind)
	}
	return readText(f, filepath.ToSlash(path), kind, hint)
}

// readText reads TOML, and refuses what is no text.
func readText(in io.Reader, name, kind, hint string) ([]byte, string, error) {
	data, err := io.ReadAll(io.LimitReader(in, maxJob+1))
	if err != nil {
		return nil, "", cannot("%s: cannot be read: %v", name, err)
	}
	data = bytes.TrimPrefix(data, []byte("\xef\xbb\xbf")) // some editors begin a file with it
	if !utf8.Valid(data) || bytes.IndexByte(data, 0) >= 0 {
		return nil, "", wrong("%s: is no text; a %s is TOML (%s)", name, kind, hint)
	}
	if len(data) > maxJob {
		return nil, "", wrong("%s: larger than a megabyte; that is no %s", name, kind)
	}
	return data, name, nil
}

// plainPathError words a file error without the system call's name, and alike on every machine.
func plainPathError(err error) string {
	var p *os.PathError
	switch {
	case !errors.As(err, &p):
		return err.Error()
	case errors.Is(err, fs.ErrNotExist):
		return p.Path + ": there is no such file"
	}
	return fmt.Sprintf("%s: %v", p.Path, p.Err)
}

// loadJob reads and resolves the job of a command, and the gears it is about. It
// returns the job with an error where its backlash cannot be had.
func loadJob(c *cli.Context) (*job, []*gear, error) {
	r, err := loadRequest(c)
	if err != nil {
		return nil, nil, err
	}
	j, err := resolve(r)
	if err != nil {
		return j, nil, err
	}
	gears, err := j.chosen(c.String("gear"))
	if err != nil {
		return nil, nil, err
	}
	return j, gears, j.readBlank(c, gears)
}

// digits returns the decimals of lengths: --digits, or the unit's own.
func (r request) digits(c *cli.Context) int {
	if d := c.Int("digits"); c.IsSet("digits") {
		return d
	}
	return r.display.Decimals()
}
