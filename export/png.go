package export

import (
	"fmt"
	"image"
	"image/color"
	"image/draw"
	"image/png"
	"io"

	"github.com/tdewolff/canvas"
	"github.com/tdewolff/canvas/renderers/rasterizer"
)

// WritePNG writes the page as a picture on white at dpi pixels an inch, 10 to 1200.
func (d Drawing) WritePNG(w io.Writer, dpi float64) error {
	if err := d.check(); err != nil {
		return fmt.Errorf("png: %w", err)
	}
	if !(dpi >= 10 && dpi <= 1200) {
		return fmt.Errorf("png: %g dots per inch: must be 10 to 1200", dpi)
	}
	fonts, err := loadTypeface()
	if err != nil {
		return fmt.Errorf("png: %w", err)
	}
	resolution := canvas.DPI(dpi)
	r := rasterizer.New(d.Width, d.Height, resolution, canvas.DefaultColorSpace)
	draw.Draw(r, r.Bounds(), image.NewUniform(color.White), image.Point{}, draw.Src)
	if err := render(d, r, fonts, wordsAsOutlines); err != nil {
		return fmt.Errorf("png: %w", err)
	}
	r.Close()
	return png.Encode(w, r.Image)
}
