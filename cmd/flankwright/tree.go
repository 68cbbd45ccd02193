package main

import (
	"errors"
	"fmt"
	"strconv"
	"strings"

	"github.com/pelletier/go-toml/v2"
	"github.com/pelletier/go-toml/v2/unstable"
)

// A place is where in a job file something stands.
type place struct {
	file      string
	line, col int
}

// String writes the place as file:line:column; a flag's place is its name alone.
func (p place) String() string {
	if p.line == 0 {
		return p.file
	}
	return fmt.Sprintf("%s:%d:%d", p.file, p.line, p.col)
}

// A value is one value of a job file or a flag, with its place. Of a job file
// the content is a string, int64, float64, bool, *table or []value; of a flag
// it is flagText.
type value struct {
	content any
	at      place
}

// flagText is a value from the command line, where everything is text.
type flagText string

// A table is a TOML table with its keys in the file's order.
type table struct {
	entries []entry
	at      place
}

type entry struct {
	key string
	at  place
	val value
}

// find returns the entry of a key, nil where there is none.
func (t *table) find(key string) *entry {
	for i := range t.entries {
		if t.entries[i].key == key {
			return &t.entries[i]
		}
	}
	return nil
}

// parseTree reads TOML into tables that keep the order and the place of every
// key. The syntax (doubled keys, redefined tables, bad literals) is checked by
// the library's own decoder first; the places come from its parser.
func parseTree(data []byte, file string) (*table, error) {
	var probe map[string]any
	if err := toml.Unmarshal(data, &probe); err != nil {
		return nil, syntaxError(err, file)
	}
	b := treeBuilder{file: file}
	b.p.Reset(data)
	root := &table{at: place{file, 1, 1}}
	current := root
	for b.p.NextExpression() {
		e := b.p.Expression()
		switch e.Kind {
		case unstable.Table, unstable.ArrayTable:
			current = b.open(root, e, e.Kind == unstable.ArrayTable)
		case unstable.KeyValue:
			b.keyValue(current, e)
		}
		if b.err != nil {
			return nil, b.err
		}
	}
	if err := b.p.Error(); err != nil {
		return nil, syntaxError(err, file)
	}
	return root, nil
}

func syntaxError(err error, file string) error {
	var d *toml.DecodeError
	if errors.As(err, &d) {
		row, col := d.Position()
		text := strings.TrimPrefix(d.Error(), "toml: ")
		if strings.Contains(text, "strconv.") {
			text = "a number is too large or too small to be one"
		}
		if strings.Contains(text, "','") {
			text += "; decimals take a point: 2.5, not 2,5"
		}
		return fault(place{file, row, col}, "%s", text)
	}
	return fault(place{file, 1, 1}, "%s", strings.TrimPrefix(err.Error(), "toml: "))
}

// A treeBuilder walks the parser's expressions; it remembers its first error.
type treeBuilder struct {
	p    unstable.Parser
	file string
	err  error
}

func (b *treeBuilder) place(n *unstable.Node) place {
	if n.Raw.Length == 0 {
		return place{b.file, 0, 0}
	}
	s := b.p.Shape(n.Raw).Start
	return place{b.file, s.Line, s.Column}
}

// open returns the table that a [header] or [[header]] names, made where needed.
func (b *treeBuilder) open(root *table, e *unstable.Node, array bool) *table {
	t := root
	it := e.Key()
	for it.Next() {
		n := it.Node()
		t = b.descend(t, string(n.Data), b.place(n), array && it.IsLast())
	}
	return t
}

// descend returns the table under a key; a new element of an array of tables where last asks for it.
func (b *treeBuilder) descend(t *table, key string, at place, element bool) *table {
	e := t.find(key)
	if e == nil {
		t.entries = append(t.entries, entry{key: key, at: at})
		e = &t.entries[len(t.entries)-1]
		e.val.at = at
		if element {
			e.val.content = []value(nil)
		} else {
			e.val.content = &table{at: at}
		}
	}
	switch c := e.val.content.(type) {
	case *table:
		return c
	case []value:
		if element {
			c = append(c, value{&table{at: at}, at})
			e.val.content = c
		}
		if len(c) > 0 {
			if last, ok := c[len(c)-1].content.(*table); ok {
				return last
			}
		}
	}
	return &table{at: at} // the decoder has refused such files before
}

func (b *treeBuilder) keyValue(t *table, e *unstable.Node) {
	it := e.Key()
	for it.Next() {
		n := it.Node()
		if !it.IsLast() {
			t = b.descend(t, string(n.Data), b.place(n), false)
			continue
		}
		at := b.place(n)
		v := b.value(e.Value(), at)
		t.entries = append(t.entries, entry{string(n.Data), at, v})
	}
}

// value converts a node; near is the place to name where the node has none.
func (b *treeBuilder) value(n *unstable.Node, near place) value {
	at := b.place(n)
	if at.line == 0 {
		at = near
	}
	v := value{at: at}
	text := string(n.Data)
	switch n.Kind {
	case unstable.String:
		v.content = text
	case unstable.Bool:
		v.content = text == "true"
	case unstable.Integer:
		v.content = b.integer(text, at)
	case unstable.Float:
		f, err := strconv.ParseFloat(strings.ReplaceAll(text, "_", ""), 64)
		b.keep(err, at, text)
		v.content = f
	case unstable.InlineTable:
		t := &table{at: at}
		for it := n.Children(); it.Next(); {
			b.keyValue(t, it.Node())
		}
		v.content = t
	case unstable.Array:
		list := []value{}
		for it := n.Children(); it.Next(); {
			list = append(list, b.value(it.Node(), at))
		}
		v.content = list
	default:
		b.keep(errors.New("no date"), at, text)
	}
	return v
}

func (b *treeBuilder) integer(text string, at place) int64 {
	i, err := strconv.ParseInt(text, 0, 64)
	b.keep(err, at, text)
	return i
}

func (b *treeBuilder) keep(err error, at place, text string) {
	if err != nil && b.err == nil {
		b.err = fault(at, "%s is neither a number nor a text that a job can use", text)
	}
}
