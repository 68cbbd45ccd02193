package main

import (
	"embed"
	"strings"

	"github.com/urfave/cli/v2"
)

//go:embed examples/*.toml
var exampleFiles embed.FS

// exampleNames lists the examples in the order in which help shows them; the
// first is what new writes.
func exampleNames() []string {
	return []string{"indexer", "warm-indexer", "feed-drive", "change-gear", "helical-table"}
}

func exampleJob(name string) ([]byte, error) {
	data, err := exampleFiles.ReadFile("examples/" + name + ".toml")
	if err != nil {
		if near, ok := nearest(name, exampleNames()); ok {
			return nil, wrong("--example: no example %q; did you mean %q?", name, near)
		}
		return nil, wrong("--example: no example %q; there are %s", name, quoted(exampleNames()))
	}
	return data, nil
}

func newCommand() *cli.Command {
	return &cli.Command{
		Name:      "new",
		Usage:     "a commented job file to start from",
		UsageText: "flankwright new [--example NAME] [-o FILE]\n\nExamples: " + strings.Join(exampleNames(), ", "),
		Flags: append(fileFlags("file to write; without it the job goes to standard output"),
			&cli.StringFlag{Name: "example", Usage: "which example", Value: exampleNames()[0]},
			&cli.BoolFlag{Name: "json", Usage: "errors as JSON", Category: catOutput, DisableDefaultText: true}),
		Action: func(c *cli.Context) error {
			if c.NArg() > 0 {
				return wrong("new takes no file to read; write it to %q by -o %s", c.Args().First(), c.Args().First())
			}
			data, err := exampleJob(c.String("example"))
			if err != nil {
				return err
			}
			return deliver(c, data)
		},
	}
}
