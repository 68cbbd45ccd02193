package export

import (
	"math"
	"strings"
	"testing"

	"flankwright/involute"
)

// A bruteGear is a gear as a polygon in the plane of the mesh, near its mate.
type bruteGear struct {
	points   []involute.Vec
	segments [][2]involute.Vec
}

// brutePoints is in how many chords a piece is cut: pieces are up to 1 mm long
// with radii from 0.3 mm, so that chords leave them by 5e-5 mm at most, on flanks 1e-5.
const brutePoints = 50

// bruteAt returns a section turned and shifted, as far as keep wants it.
func bruteAt(s Section, turned float64, shift involute.Vec, keep func(involute.Vec) bool) bruteGear {
	var g bruteGear
	for _, c := range s.curves {
		p, _ := c.At(0)
		p = p.Rotate(turned).Add(shift)
		for i := 1; i <= brutePoints; i++ {
			q, _ := c.At(float64(i) / brutePoints)
			q = q.Rotate(turned).Add(shift)
			if keep(p) || keep(q) {
				g.points = append(g.points, p)
				g.segments = append(g.segments, [2]involute.Vec{p, q})
			}
			p = q
		}
	}
	return g
}

// inside reports whether a point lies inside the polygon: the ray from it along
// ±x crosses an odd number of sides.
func (g bruteGear) inside(p involute.Vec, way float64) bool {
	odd := false
	for _, s := range g.segments {
		a, b := s[0], s[1]
		if (a.Y > p.Y) == (b.Y > p.Y) {
			continue
		}
		if x := a.X + (p.Y-a.Y)/(b.Y-a.Y)*(b.X-a.X); (x-p.X)*way > 0 {
			odd = !odd
		}
	}
	return odd
}

// bruteMesh returns both gears at one position, as far as they reach into each
// other's tip circles and a margin beyond.
func bruteMesh(m rollMesh, angle, extra, margin float64) (one, two bruteGear) {
	axis := involute.Vec{X: m.center}
	ratio := float64(m.first.Teeth()) / float64(m.second.Teeth())
	// What lies before the mate's farthest point is crossed by rays, whatever its height.
	one = bruteAt(m.first, angle-m.first.space(0), involute.Vec{}, func(p involute.Vec) bool { return p.X > m.center-m.second.most-margin })
	two = bruteAt(m.second, math.Pi-m.second.tooth(0)-angle*ratio+extra, axis, func(p involute.Vec) bool { return p.X < m.first.most+margin })
	return one, two
}

// bruteOverlap reports whether a point of one gear lies inside the other.
func bruteOverlap(m rollMesh, angle, extra float64) bool {
	one, two := bruteMesh(m, angle, extra, 0)
	axis := involute.Vec{X: m.center}
	for _, p := range one.points {
		if p.Sub(axis).Norm() < m.second.most && two.inside(p, -1) {
			return true
		}
	}
	for _, p := range two.points {
		if p.Norm() < m.first.most && one.inside(p, 1) {
			return true
		}
	}
	return false
}

// bruteClearance returns the least distance between the points of one gear and the sides of the other.
func bruteClearance(m rollMesh, angle, extra float64) float64 {
	one, two := bruteMesh(m, angle, extra, 1)
	least := math.Inf(1)
	for _, way := range [...][2]bruteGear{{one, two}, {two, one}} {
		for _, p := range way[0].points {
			for _, s := range way[1].segments {
				if math.Abs(s[0].X-p.X) < least+0.05 && math.Abs(s[0].Y-p.Y) < least+0.05 {
					least = math.Min(least, distanceToChord(s[0], s[1], p))
				}
			}
		}
	}
	return least
}

// straightened returns the section with every arc replaced by its chord: lines that meet the mate's arcs.
func straightened(t testing.TB, s Section) Section {
	t.Helper()
	vs := append([]Vertex(nil), s.path.Vertices...)
	for i := range vs {
		vs[i].Bulge = 0
	}
	out, err := NewSection(Path{Vertices: vs}, 0)
	if err != nil {
		t.Fatal(err)
	}
	return out
}

// Polygons turned by hand: at the contacts that were found the gears are free a
// hair before and overlap a hair beyond, on both sides, and in the middle of
// the play they are as far apart as was found.
func TestRollByBruteForce(t *testing.T) {
	chamfered := spur(30, 1, 0.1)
	chamfered.TipChamfer = 0.12
	short := spur(20, 2, 0)
	short.TipDiameter = 41.2
	high := spur(60, 2, 0)
	high.TipDiameter = 124.9 // its corners come into the fillets before the flanks touch
	pairs := append(rollPairs()[:5],
		rollPair{"chamfered", chamfered, spur(17, 1, 0.3), 0.03, 23.93},
		rollPair{"short tips", short, short, 0.02, 40.02},
		rollPair{"corners in fillets", spur(12, 2, 0), high, 0.1, 72},
		rollPair{"first of chords", spur(18, 1, 0.2), spur(25, 1, 0), 0.1, 21.75},
		rollPair{"second of chords", spur(18, 1, 0.2), spur(25, 1, 0), 0.1, 21.75},
	)
	const hair = 1e-4 // mm
	for _, p := range pairs {
		one, two, _ := p.teeth(t)
		s1, _ := drawn(t, one, 0.0025)
		s2, _ := drawn(t, two, 0.0025)
		switch p.name {
		case "first of chords":
			s1 = straightened(t, s1)
		case "second of chords":
			s2 = straightened(t, s2)
		}
		m, err := newRollMesh(s1, s2, p.center)
		if err != nil {
			t.Fatal(p.name, err)
		}
		shares := []float64{0, 0.13, 0.29, 0.5, 0.66, 0.87}
		if strings.Contains(p.name, "chords") { // contact changes between lines and their ends
			shares = append(shares, 0.07, 0.2, 0.36, 0.41, 0.56, 0.73)
		}
		for _, share := range shares {
			s := m.stand(2 * math.Pi / float64(s1.Teeth()) * share)
			if s.play() <= 0 {
				t.Fatalf("%s: no play: %+v", p.name, s)
			}
			eps := hair / (two.BaseDiameter() / 2)
			for name, turns := range map[string][2]float64{"forward": {s.forward, eps}, "backward": {s.backward, -eps}} {
				if bruteOverlap(m, s.angle, turns[0]-turns[1]) {
					t.Errorf("%s at %.2f: polygons overlap before the %s contact", p.name, share, name)
				}
				if !bruteOverlap(m, s.angle, turns[0]+turns[1]) {
					t.Errorf("%s at %.2f: polygons are free beyond the %s contact", p.name, share, name)
				}
			}
			want := bruteClearance(m, s.angle, (s.forward+s.backward)/2)
			if got := m.clearance(s); math.Abs(got-want) > hair {
				t.Errorf("%s at %.2f: %.6f apart, by brute force %.6f", p.name, share, got, want)
			}
		}
	}
}
