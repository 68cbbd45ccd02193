package export

import (
	"bytes"
	"image"
	"image/color"
	"image/png"
	"testing"
)

func decodePNG(t *testing.T, file []byte) image.Image {
	t.Helper()
	img, err := png.Decode(bytes.NewReader(file))
	if err != nil {
		t.Fatal(err)
	}
	return img
}

// grayAt returns how light a point is, 0 to 255.
func grayAt(img image.Image, x, y int) int {
	return int(color.GrayModel.Convert(img.At(x, y)).(color.Gray).Y)
}

func abs(x int) int { return max(x, -x) }
