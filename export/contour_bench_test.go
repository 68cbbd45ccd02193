package export

import (
	"testing"

	"flankwright/involute"
)

// demoGear is the driven gear of the indexing fixture: 45 teeth of 16 DP, shifted.
func demoGear(b *testing.B) involute.Tooth {
	return tooth(b, involute.Spec{Teeth: 45, Module: 25.4 / 16, Shift: 0.278, Rack: isoA()}, 0.04)
}

// thousandth is the smoothing tolerance that is usual in inch shops: ±0.001 in.
const thousandth = 0.0254 // mm

// Arcs against straight lines and against close points, all within a thousandth of
// an inch: the time for one gear, and how many times more pieces and bytes of DXF
// lines take. Common practice has it that smoothing to a thousandth turns hundreds of
// points into a handful and makes the file some sixteen times smaller; what that
// was measured on is not known. Here "points" are the corners of lines within a
// hundredth of the tolerance, as a converter writes them that must not lose any.
func BenchmarkContourAtAThousandth(b *testing.B) {
	t := demoGear(b)
	encode := func(o FitOptions) (FitReport, int) {
		outline, r, err := NewContour(ContourSpec{Tooth: t, Fit: o})
		if err != nil {
			b.Fatal(err)
		}
		data, err := FormatDXF.Encode(outline)
		if err != nil {
			b.Fatal(err)
		}
		return r, len(data)
	}
	empty, err := FormatDXF.Encode(Outline{Circles: []Circle{{Layer: LayerBore, Radius: 1}}})
	if err != nil {
		b.Fatal(err)
	}
	var arcs, lines, points FitReport
	var arcBytes, lineBytes, pointBytes int
	for b.Loop() {
		arcs, arcBytes = encode(FitOptions{Tolerance: thousandth})
	}
	lines, lineBytes = encode(FitOptions{Tolerance: thousandth, Lines: true})
	points, pointBytes = encode(FitOptions{Tolerance: thousandth / 100, Lines: true})
	own := func(n int) float64 { return float64(n - len(empty)) }
	b.ReportMetric(float64(arcs.Segments), "arcs")
	b.ReportMetric(float64(lines.Segments)/float64(arcs.Segments), "lines/arc")
	b.ReportMetric(own(lineBytes)/own(arcBytes), "line-bytes/arc-bytes")
	b.ReportMetric(float64(points.Segments)/float64(arcs.Segments), "points/arc")
	b.ReportMetric(own(pointBytes)/own(arcBytes), "point-bytes/arc-bytes")
}

// The default tolerance, arcs alone: what a contour costs.
func BenchmarkContourDefault(b *testing.B) {
	t := demoGear(b)
	for b.Loop() {
		if _, _, err := NewContour(ContourSpec{Tooth: t, Fit: FitOptions{Tolerance: 0.0025}}); err != nil {
			b.Fatal(err)
		}
	}
}
