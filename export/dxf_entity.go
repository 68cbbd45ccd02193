package export

import (
	"strings"

	"flankwright/inspect"
	"flankwright/involute"
)

// Flags of a polyline (group 70), by the DXF reference.
const (
	polylineClosed = 1
	polylineOther  = 2 | 4 | 8 | 16 | 64 // curve-fit, spline, 3D, mesh, polyface: no plane outline
	polylineKnown  = 1 | polylineOther | 32 | 128
)

// A dxfEntity holds what an outline needs of one entity.
type dxfEntity struct {
	dxfPair   // the 0 that opens it
	layer     Layer
	paper     bool
	vertices  []Vertex
	hasY      bool // of the last vertex
	flags     int
	count     int // group 90, −1 where missing
	radius    float64
	extrusion [3]float64
}

// entity reads the entity at the current pair and puts it in the outline.
func (d *dxfReader) entity() error {
	if d.pair.code != 0 {
		return d.pair.errorf("group %d before the first entity", d.pair.code)
	}
	e, err := d.groups()
	if err != nil {
		return err
	}
	kind := strings.TrimSpace(e.value)
	if kind == "POLYLINE" {
		if err := d.polylineVertices(&e); err != nil {
			return err
		}
	}
	switch {
	case kind == "VERTEX" || kind == "SEQEND":
		return e.errorf("%s outside a POLYLINE", kind)
	case kind != "LWPOLYLINE" && kind != "POLYLINE" && kind != "CIRCLE":
		if len(kind) > 40 {
			return e.errorf("%.40q is no entity", kind)
		}
		d.out.skip(kind, e.line)
		return nil
	case e.paper:
		d.out.skip(kind+" in paper space", e.line)
		return nil
	case e.extrusion != [3]float64{0, 0, 1}:
		return e.errorf("%s is not seen from above (groups 210 to 230 should be 0, 0, 1)", kind)
	case kind == "CIRCLE":
		if len(e.vertices) != 1 {
			return e.errorf("CIRCLE with %d centers", len(e.vertices))
		}
		d.circles = append(d.circles, e.dxfPair)
		d.out.Circles = append(d.out.Circles, Circle{e.layer, e.vertices[0].P, e.radius})
		return nil
	}
	return d.contour(e, kind)
}

// contour puts a polyline in the outline.
func (d *dxfReader) contour(e dxfEntity, kind string) error {
	if kind == "LWPOLYLINE" && e.count != len(e.vertices) {
		return e.errorf("LWPOLYLINE says %d vertices (group 90) and has %d", e.count, len(e.vertices))
	}
	if e.flags&polylineOther != 0 || e.flags&^polylineKnown != 0 {
		return e.errorf("%s with flags %d (group 70) is no plane outline", kind, e.flags)
	}
	path := Path{Vertices: e.vertices}
	if e.flags&polylineClosed == 0 { // the unit may not be known yet: inches are the stricter
		n := len(e.vertices)
		if n < 3 || e.vertices[0].P.Sub(e.vertices[n-1].P).Norm() >= minPiece/inspect.Inch.MM() {
			return e.errorf("%s is open; an outline must be closed (group 70, flag 1)", kind)
		}
		path.Vertices = e.vertices[:n-1]
	}
	if len(path.Vertices) < 2 {
		return e.errorf("%s with %d vertices; at least 2 are needed", kind, len(path.Vertices))
	}
	d.contours = append(d.contours, e.dxfPair)
	d.out.Contours = append(d.out.Contours, Contour{e.layer, path})
	return nil
}

// polylineVertices reads the VERTEX entities of a POLYLINE, up to its SEQEND.
func (d *dxfReader) polylineVertices(e *dxfEntity) error {
	e.vertices = nil // the POLYLINE's own point is a dummy
	for {
		switch {
		case d.pair.is(0, "VERTEX"):
			v, err := d.groups()
			if err != nil {
				return err
			}
			if len(v.vertices) != 1 {
				return v.errorf("VERTEX with %d points", len(v.vertices))
			}
			if v.flags != 0 {
				return v.errorf("VERTEX with flags %d (group 70) is no corner of a plane outline", v.flags)
			}
			e.vertices = append(e.vertices, v.vertices[0])
		case d.pair.is(0, "SEQEND"):
			_, err := d.groups()
			return err
		default:
			return d.pair.errorf("%.40q where VERTEX or SEQEND should be", d.pair.value)
		}
	}
}

// groups reads the groups of the entity at the current pair and stops at the next 0.
func (d *dxfReader) groups() (dxfEntity, error) {
	e := dxfEntity{dxfPair: d.pair, layer: "0", count: -1, hasY: true, extrusion: [3]float64{0, 0, 1}}
	used := false
	switch strings.TrimSpace(e.value) {
	case "LWPOLYLINE", "POLYLINE", "VERTEX", "CIRCLE":
		used = true
	}
	for {
		if err := d.advance(); err != nil {
			return e, err
		}
		if d.pair.code == 0 {
			break
		}
		if used {
			if err := d.group(&e); err != nil {
				return e, err
			}
		}
	}
	if !e.hasY {
		return e, e.errorf("the last point has no y (group 20)")
	}
	return e, nil
}

// group takes one group of an entity.
func (d *dxfReader) group(e *dxfEntity) (err error) {
	p := d.pair
	switch p.code {
	case 8:
		e.layer = Layer(strings.TrimSpace(p.value))
	case 67:
		n, err := p.whole()
		e.paper = n == 1
		return err
	case 70:
		e.flags, err = p.whole()
	case 90:
		e.count, err = p.whole()
	case 40:
		e.radius, err = p.number()
	case 210, 220, 230:
		e.extrusion[p.code/10-21], err = p.number()
	case 10, 20, 42:
		return d.vertexGroup(e)
	}
	return err
}

// vertexGroup takes x (which opens a vertex), y or bulge.
func (d *dxfReader) vertexGroup(e *dxfEntity) error {
	x, err := d.pair.number()
	if err != nil {
		return err
	}
	n := len(e.vertices)
	switch {
	case d.pair.code == 10:
		if !e.hasY {
			return d.pair.errorf("the point before has no y (group 20)")
		}
		if d.vertices++; d.vertices > maxOutlineVertices {
			return d.pair.errorf("more than %d vertices", maxOutlineVertices)
		}
		e.vertices = append(e.vertices, Vertex{P: involute.Vec{X: x}})
		e.hasY = false
	case n == 0:
		return d.pair.errorf("group %d before the vertex's x (group 10)", d.pair.code)
	case d.pair.code == 20:
		if e.hasY {
			return d.pair.errorf("a second y (group 20) for one vertex")
		}
		e.vertices[n-1].P.Y = x
		e.hasY = true
	default:
		e.vertices[n-1].Bulge = x
	}
	return nil
}
