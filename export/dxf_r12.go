package export

import "flankwright/involute"

// r12 writes the sections of an AC1009 file. Handles are optional there, and left out.
func (d *dxfWriter) r12(f Outline) {
	d.begin("HEADER")
	d.header("AC1009", f)
	d.end()

	d.begin("TABLES")
	dash, gap := dashes(f.Unit)
	d.put(0, "TABLE", 2, "LTYPE", 70, 2)
	d.put(0, "LTYPE", 2, "CONTINUOUS", 70, 0, 3, "Solid line", 72, 65, 73, 0, 40, 0.0)
	d.put(0, "LTYPE", 2, "DASHED", 70, 0, 3, "Dashed __ __ __", 72, 65, 73, 2, 40, dash+gap, 49, dash, 49, -gap)
	d.put(0, "ENDTAB")
	styles := f.layerStyles()
	d.put(0, "TABLE", 2, "LAYER", 70, len(styles))
	for _, l := range styles {
		d.put(0, "LAYER", 2, l.name, 70, 0, 62, l.color, 6, l.lineType())
	}
	d.put(0, "ENDTAB")
	d.end()

	d.begin("BLOCKS")
	d.end()

	d.begin("ENTITIES")
	for _, c := range f.Contours {
		d.put(0, "POLYLINE", 8, c.Layer, 66, 1)
		d.point(10, involute.Vec{})
		d.put(70, 1)
		for _, v := range c.Path.Vertices {
			d.put(0, "VERTEX", 8, c.Layer)
			d.point(10, v.P)
			d.put(42, v.Bulge)
		}
		d.put(0, "SEQEND", 8, c.Layer)
	}
	for _, c := range f.Circles {
		d.put(0, "CIRCLE", 8, c.Layer)
		d.point(10, c.Center)
		d.put(40, c.Radius)
	}
	d.end()
}
