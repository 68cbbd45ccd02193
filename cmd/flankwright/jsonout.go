package main

import (
	"bytes"
	"encoding/json"

	"github.com/urfave/cli/v2"

	"flankwright/inspect"
)

// ordered is a JSON object that keeps the order of the job file.
type ordered struct {
	keys []string
	vals []any
}

func (o *ordered) add(key string, v any) {
	o.keys, o.vals = append(o.keys, key), append(o.vals, v)
}

// MarshalJSON writes the keys in their order.
func (o ordered) MarshalJSON() ([]byte, error) {
	var b bytes.Buffer
	b.WriteByte('{')
	for i, k := range o.keys {
		if i > 0 {
			b.WriteByte(',')
		}
		name, err := json.Marshal(k)
		if err != nil {
			return nil, err
		}
		v, err := json.Marshal(o.vals[i])
		if err != nil {
			return nil, err
		}
		b.Write(name)
		b.WriteByte(':')
		b.Write(v)
	}
	b.WriteByte('}')
	return b.Bytes(), nil
}

// span is a range in JSON.
type span struct {
	Min float64 `json:"min"`
	Max float64 `json:"max"`
}

func toSpan(l inspect.Limits) span { return span{l.Min, l.Max} }

// jsonText encodes a result, indented, without escaping < > &.
func jsonText(v any) ([]byte, error) {
	var b bytes.Buffer
	e := json.NewEncoder(&b)
	e.SetEscapeHTML(false)
	e.SetIndent("", "  ")
	if err := e.Encode(v); err != nil {
		return nil, cannot("a result is no number: %v", err)
	}
	return b.Bytes(), nil
}

// emit delivers a result as JSON or as text, to -o or to standard output.
func emit(c *cli.Context, result any, text func() []byte) error {
	data, err := render(c, result, text)
	if err != nil {
		return err
	}
	return deliver(c, data)
}

// emitBeside prints a result to standard output where -o names a drawing or a folder.
func emitBeside(c *cli.Context, result any, text func() []byte) error {
	data, err := render(c, result, text)
	if err != nil {
		return err
	}
	return toStdout(c, data)
}

func render(c *cli.Context, result any, text func() []byte) ([]byte, error) {
	if c.Bool("json") {
		return jsonText(result)
	}
	return text(), nil
}

func toStdout(c *cli.Context, data []byte) error {
	if _, err := c.App.Writer.Write(data); err != nil {
		return cannot("standard output: %v", err)
	}
	return nil
}
