package main

import (
	"embed"
	"strings"

	"github.com/urfave/cli/v2"
)

//go:embed examples/*.toml
var exampleFiles embed.FS

//go:embed examples/shop/shop.toml
var shopExample []byte

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
		Usage:     "a commented job file to start from, or a shop file",
		UsageText: "flankwright new [--example NAME] [-o FILE]\nflankwright new --shop [-o shop.toml]\n\nExamples: " + strings.Join(exampleNames(), ", "),
		Flags: append(fileFlags("file to write; without it the job goes to standard output"),
			&cli.StringFlag{Name: "example", Usage: "which example", Value: exampleNames()[0]},
			&cli.BoolFlag{Name: "shop", Usage: "a shop file, that says what is on hand, instead of a job", DisableDefaultText: true},
			&cli.BoolFlag{Name: "json", Usage: "errors as JSON", Category: catOutput, DisableDefaultText: true}),
		Action: func(c *cli.Context) error {
			if c.NArg() > 0 {
				return wrong("new takes no file to read; write it to %q by -o %s", c.Args().First(), c.Args().First())
			}
			if c.Bool("shop") {
				if c.IsSet("example") {
					return wrong("--shop: writes a shop file and --example a job; give one of them")
				}
				return deliver(c, shopExample)
			}
			data, err := exampleJob(c.String("example"))
			if err != nil {
				return err
			}
			return deliver(c, data)
		},
	}
}
