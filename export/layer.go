package export

// A Layer is the name of a layer in an outline file.
type Layer string

// The layers of the files we write. What is cut and what is only to be looked
// at never share one, so that CAM can take the first and leave the rest.
const (
	LayerCut       Layer = "CUT"       // the gear's contour
	LayerMate      Layer = "MATE"      // the contour of the second gear of a mesh
	LayerBore      Layer = "BORE"      // bore and keyway
	LayerHoles     Layer = "HOLES"     // the holes of a bolt circle
	LayerHub       Layer = "HUB"       // the hub's outside, a step on one face
	LayerPins      Layer = "PINS"      // measuring pins where they rest: not to be cut
	LayerReference Layer = "REFERENCE" // pitch, base, tip, root and form circles: not to be cut
)

// A layerStyle is how a layer looks.
type layerStyle struct {
	name     Layer
	color    int    // DXF color index: 7 black or white, 5 blue, 3 green, 6 magenta, 8 gray
	stroke   string // the same in an SVG
	dashed   bool
	width    float64 // of lines in an SVG, mm
	contours bool    // may hold closed contours, not circles alone
}

// lineType returns the name of the DXF line type.
func (l layerStyle) lineType() string {
	if l.dashed {
		return "DASHED"
	}
	return "CONTINUOUS"
}

// allLayers returns the layers, those to be cut first; they are drawn from the last to the first.
func allLayers() []layerStyle {
	return []layerStyle{
		{LayerCut, 7, "#000000", false, svgCutLine, true},
		{LayerMate, 7, "#000000", false, svgCutLine, true},
		{LayerBore, 5, "#0000ff", false, svgCutLine, true},
		{LayerHoles, 5, "#0000ff", false, svgCutLine, false},
		{LayerHub, 3, "#008000", true, svgThinLine, false},
		{LayerPins, 6, "#a000a0", false, svgThinLine, false},
		{LayerReference, 8, "#808080", true, svgThinLine, false},
	}
}

// styleOf returns the style of a layer, false where it is none of ours.
func styleOf(name Layer) (layerStyle, bool) {
	for _, l := range allLayers() {
		if l.name == name {
			return l, true
		}
	}
	return layerStyle{}, false
}

// layerStyles returns the layers that the outline uses, after layer 0, which
// must be in every DXF.
func (o Outline) layerStyles() []layerStyle {
	used := map[Layer]bool{}
	for _, c := range o.Contours {
		used[c.Layer] = true
	}
	for _, c := range o.Circles {
		used[c.Layer] = true
	}
	styles := []layerStyle{{name: "0", color: 7}}
	for _, l := range allLayers() {
		if used[l.name] {
			styles = append(styles, l)
		}
	}
	return styles
}
