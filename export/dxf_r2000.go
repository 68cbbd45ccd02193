package export

import "strconv"

// Handles of the fixed parts of an R2000 file. Entities follow from firstEntity on.
const (
	hBlockRecords = "1"
	hLayers       = "2"
	hStyles       = "3"
	hLineTypes    = "5"
	hViews        = "6"
	hUCSs         = "7"
	hViewports    = "8"
	hAppIDs       = "9"
	hDimStyles    = "A"
	hRoot         = "C"
	hGroups       = "D"
	hModel        = "1F"
	hPaper        = "1B"
	firstEntity   = 0x40
)

// r2000 writes the sections of an AC1015 file.
func (d *dxfWriter) r2000(f Outline) {
	count := len(f.Contours) + len(f.Circles)
	d.begin("HEADER")
	d.header("AC1015", f)
	d.put(9, "$HANDSEED", 5, dxfHandle(firstEntity+count))
	d.end()
	d.begin("CLASSES")
	d.end()
	d.begin("TABLES")
	d.viewports(f)
	d.lineTypes(f)
	d.layers(f)
	d.otherTables()
	d.end()
	d.begin("BLOCKS")
	d.block("*Model_Space", hModel, "20", "21", 0)
	d.block("*Paper_Space", hPaper, "1C", "1D", 1)
	d.end()
	d.begin("ENTITIES")
	d.entities(f)
	d.end()
	d.begin("OBJECTS")
	d.put(0, "DICTIONARY", 5, hRoot, 330, "0", 100, "AcDbDictionary", 281, 1, 3, "ACAD_GROUP", 350, hGroups)
	d.put(0, "DICTIONARY", 5, hGroups, 330, hRoot, 100, "AcDbDictionary", 281, 1)
	d.end()
}

// dxfHandle formats a handle: hexadecimal, upper case.
func dxfHandle(n int) string {
	const digits = "0123456789ABCDEF"
	if n < 16 {
		return digits[n : n+1]
	}
	return dxfHandle(n/16) + digits[n%16:n%16+1]
}

// entities writes the contours, then the circles.
func (d *dxfWriter) entities(f Outline) {
	next := firstEntity
	entity := func(kind string, layer Layer, class string) {
		d.put(0, kind, 5, dxfHandle(next), 330, hModel, 100, "AcDbEntity", 8, layer, 100, class)
		next++
	}
	for _, c := range f.Contours {
		entity("LWPOLYLINE", c.Layer, "AcDbPolyline")
		d.put(90, len(c.Path.Vertices), 70, 1, 43, 0.0)
		for _, v := range c.Path.Vertices {
			d.put(10, v.P.X, 20, v.P.Y, 42, v.Bulge)
		}
	}
	for _, c := range f.Circles {
		entity("CIRCLE", c.Layer, "AcDbCircle")
		d.point(10, c.Center)
		d.put(40, c.Radius)
	}
}

// table opens a symbol table of n records.
func (d *dxfWriter) table(name, handle string, n int) {
	d.put(0, "TABLE", 2, name, 5, handle, 330, "0", 100, "AcDbSymbolTable", 70, n)
}

// record opens a record of a symbol table.
func (d *dxfWriter) record(kind, handle, table, class string, name any) {
	d.put(0, kind, 5, handle, 330, table, 100, "AcDbSymbolTableRecord", 100, class, 2, name)
}

// viewports writes the one view a drawing opens with: the whole outline.
func (d *dxfWriter) viewports(f Outline) {
	lo, hi := f.bounds()
	mid, size := lo.Add(hi).Scale(0.5), hi.Sub(lo)
	d.table("VPORT", hViewports, 1)
	d.record("VPORT", "22", hViewports, "AcDbViewportTableRecord", "*Active")
	d.put(70, 0, 10, 0.0, 20, 0.0, 11, 1.0, 21, 1.0) // the whole screen
	d.put(12, mid.X, 22, mid.Y, 13, 0.0, 23, 0.0, 14, 1.0, 24, 1.0, 15, 1.0, 25, 1.0)
	d.put(16, 0.0, 26, 0.0, 36, 1.0, 17, 0.0, 27, 0.0, 37, 0.0)          // seen from above
	d.put(40, 1.1*max(size.X, size.Y), 41, 1.0, 42, 50.0)                // height, aspect, lens
	d.put(43, 0.0, 44, 0.0, 50, 0.0, 51, 0.0, 71, 0, 72, 100, 73, 1)     // no clipping, smooth circles
	d.put(74, 3, 75, 0, 76, 0, 77, 0, 78, 0, 281, 0, 65, 1, 0, "ENDTAB") // no snap, no grid
}

// lineTypes writes the three that every file needs, and DASHED.
func (d *dxfWriter) lineTypes(f Outline) {
	const class = "AcDbLinetypeTableRecord"
	dash, gap := dashes(f.Unit)
	d.table("LTYPE", hLineTypes, 4)
	for _, l := range [...]struct{ handle, name, text string }{
		{"14", "ByBlock", ""}, {"15", "ByLayer", ""}, {"16", "CONTINUOUS", "Solid line"},
	} {
		d.record("LTYPE", l.handle, hLineTypes, class, l.name)
		d.put(70, 0, 3, l.text, 72, 65, 73, 0, 40, 0.0)
	}
	d.record("LTYPE", "17", hLineTypes, class, "DASHED")
	d.put(70, 0, 3, "Dashed __ __ __", 72, 65, 73, 2, 40, dash+gap, 49, dash, 74, 0, 49, -gap, 74, 0)
	d.put(0, "ENDTAB")
}

// layers writes the layer table; handles from 30 on.
func (d *dxfWriter) layers(f Outline) {
	styles := f.layerStyles()
	d.table("LAYER", hLayers, len(styles))
	for i, l := range styles {
		d.record("LAYER", "3"+strconv.Itoa(i), hLayers, "AcDbLayerTableRecord", l.name)
		d.put(70, 0, 62, l.color, 6, l.lineType())
	}
	d.put(0, "ENDTAB")
}

// otherTables writes the tables a file must have though an outline needs none of them.
func (d *dxfWriter) otherTables() {
	d.table("STYLE", hStyles, 1)
	d.record("STYLE", "11", hStyles, "AcDbTextStyleTableRecord", "Standard")
	d.put(70, 0, 40, 0.0, 41, 1.0, 50, 0.0, 71, 0, 42, 1.0, 3, "txt", 4, "", 0, "ENDTAB")
	d.table("VIEW", hViews, 0)
	d.put(0, "ENDTAB")
	d.table("UCS", hUCSs, 0)
	d.put(0, "ENDTAB")
	d.table("APPID", hAppIDs, 1)
	d.record("APPID", "12", hAppIDs, "AcDbRegAppTableRecord", "ACAD")
	d.put(70, 0, 0, "ENDTAB")
	d.table("DIMSTYLE", hDimStyles, 1)
	d.put(100, "AcDbDimStyleTable")
	d.put(0, "DIMSTYLE", 105, "27", 330, hDimStyles)
	d.put(100, "AcDbSymbolTableRecord", 100, "AcDbDimStyleTableRecord", 2, "Standard", 70, 0, 0, "ENDTAB")
	d.table("BLOCK_RECORD", hBlockRecords, 2)
	d.record("BLOCK_RECORD", hModel, hBlockRecords, "AcDbBlockTableRecord", "*Model_Space")
	d.record("BLOCK_RECORD", hPaper, hBlockRecords, "AcDbBlockTableRecord", "*Paper_Space")
	d.put(0, "ENDTAB")
}

// block writes an empty block; space is 1 for paper.
func (d *dxfWriter) block(name, owner, begin, end string, space int) {
	open := func(kind, handle, class string) {
		d.put(0, kind, 5, handle, 330, owner, 100, "AcDbEntity")
		if space == 1 {
			d.put(67, 1)
		}
		d.put(8, "0", 100, class)
	}
	open("BLOCK", begin, "AcDbBlockBegin")
	d.put(2, name, 70, 0, 10, 0.0, 20, 0.0, 30, 0.0, 3, name, 1, "")
	open("ENDBLK", end, "AcDbBlockEnd")
}
