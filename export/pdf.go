package export

import (
	"bytes"
	"fmt"
	"io"

	"github.com/tdewolff/canvas/renderers/pdf"
)

// WritePDF writes the pages as one PDF file that measures true in mm, with words that
// can be searched, the fonts embedded, and the wish to be printed unscaled. The same
// pages give the same bytes at any time. No page, or a number that is none, is refused.
// It is no method of Drawing, as WriteSVG and WritePNG are, since a PDF holds many pages.
func WritePDF(w io.Writer, title string, pages []Drawing) error {
	if len(pages) == 0 {
		return fmt.Errorf("pdf: no page to write")
	}
	fonts, err := loadTypeface()
	if err != nil {
		return fmt.Errorf("pdf: %w", err)
	}
	var file bytes.Buffer
	r := pdf.New(&file, pages[0].Width, pages[0].Height, nil)
	for i, d := range pages {
		if err := d.check(); err != nil {
			return fmt.Errorf("pdf: page %d: %w", i+1, err)
		}
		if i > 0 {
			r.NewPage(d.Width, d.Height)
		}
		if err := render(d, r, fonts, wordsAsText); err != nil {
			return fmt.Errorf("pdf: page %d: %w", i+1, err)
		}
	}
	if err := r.Close(); err != nil {
		return fmt.Errorf("pdf: %w", err)
	}
	settled, err := settlePDF(file.Bytes(), title)
	if err != nil {
		return fmt.Errorf("pdf: %w", err)
	}
	_, err = w.Write(settled)
	return err
}
