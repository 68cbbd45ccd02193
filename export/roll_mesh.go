package export

import (
	"fmt"
	"math"

	"flankwright/involute"
)

// A rollMesh is two sections in mesh: the first about the origin, the second
// about (center, 0). With the first gear's turn at 0 the first of its spaces
// stands on the line of centers, and the first tooth of the second in it.
//
// Where the first gear drives counter-clockwise, the sides of its teeth that
// run down from the tip push the like sides of the second; the sides that run up
// touch when the second is turned the other way. Those are looked at in a
// mirror, so that one search serves both.
type rollMesh struct {
	first, second Section
	center        float64
	span          int // spaces to either side of the line of centers that may touch
	down, up      rollSide
}

// A rollSide is one side of every tooth of both gears, each about its own axis.
type rollSide struct {
	first, second [][]rollPiece // first: beside space k; second: of tooth −k
	mirror        float64       // 1, or −1 for sides seen in the mirror
}

// newRollMesh readies two sections.
func newRollMesh(first, second Section, center float64) (rollMesh, error) {
	m := rollMesh{first: first, second: second, center: center}
	reach, err := m.reach()
	if err != nil {
		return m, err
	}
	m.span = int(math.Ceil(reach*float64(first.Teeth())/(2*math.Pi))) + 1
	m.down, m.up = rollSide{mirror: 1}, rollSide{mirror: -1}
	for k := range first.Teeth() {
		m.down.first = append(m.down.first, readied(first.half(k, true), false))
		m.up.first = append(m.up.first, readied(first.half(k+1, false), true))
	}
	for k := range second.Teeth() {
		m.down.second = append(m.down.second, readied(second.half(-k, true), false))
		m.up.second = append(m.up.second, readied(second.half(-k, false), true))
	}
	return m, nil
}

// reach returns the angle about the first axis within which the tip circles overlap.
func (m rollMesh) reach() (float64, error) {
	a, r1, r2 := m.center, m.first.most, m.second.most
	switch {
	case !positive(a):
		return 0, fmt.Errorf("roll: a center distance of %g mm: must be a length above 0", a)
	case a >= r1+r2:
		return 0, fmt.Errorf("roll: at a center distance of %.4g mm tips of %.4g and %.4g mm diameter do not reach each other", a, 2*r1, 2*r2)
	case a <= max(r1, r2):
		return 0, fmt.Errorf("roll: a center distance of %.4g mm lies inside a gear of %.4g mm diameter: external gears alone are rolled", a, 2*max(r1, r2))
	}
	return math.Acos((a*a + r1*r1 - r2*r2) / (2 * a * r1)), nil
}

// readied returns pieces ready to be rolled, in the mirror if wanted.
func readied(cs []involute.Curve, mirror bool) []rollPiece {
	var out []rollPiece
	for _, c := range cs {
		if mirror {
			c = involute.Mirrored(c)
		}
		out = append(out, newRollPiece(c).measured())
	}
	return out
}

// A stand is how the second gear can stand with the first one turned by angle:
// from the place by the exact ratio it can go by backward ≤ turn ≤ forward.
type stand struct {
	angle             float64
	forward, backward float64 // radians, counter-clockwise; +Inf and −Inf where nothing touches
	lever             float64 // of the forward contact's normal about the second axis, mm
}

// play returns the turn between the two contacts, negative where the teeth overlap.
func (s stand) play() float64 { return s.forward - s.backward }

// stand finds both contacts with the first gear turned by angle.
func (m rollMesh) stand(angle float64) stand {
	down, up := m.touch(m.down, angle), m.touch(m.up, angle)
	return stand{angle, down.turn, -up.turn, down.lever}
}

// motion returns how a side of the first gear moves into the second one's own
// frame, the second being turned by extra beyond the exact ratio.
func (m rollMesh) motion(side rollSide, angle, extra float64) motion {
	ratio := float64(m.first.Teeth()) / float64(m.second.Teeth())
	one := side.mirror * (angle - m.first.space(0))
	two := side.mirror * (math.Pi - m.second.tooth(0) - angle*ratio + extra)
	sin, cos := math.Sincos(one - two)
	return motion{sin, cos, involute.Polar(m.center, math.Pi-two)}
}

// facing calls f with each pair of tooth sides that may meet: the first gear's
// pieces in the second one's frame, and the second's.
func (m rollMesh) facing(side rollSide, angle, extra float64, f func(a rollPiece, second []rollPiece)) {
	move := m.motion(side, angle, extra)
	n1, n2 := len(side.first), len(side.second)
	// Beyond the second gear's tips by a tooth's height nothing is near.
	far := 2*m.second.most - m.second.least
	for k := -m.span; k <= m.span; k++ {
		second := side.second[((k%n2)+n2)%n2]
		for _, p := range side.first[((k%n1)+n1)%n1] {
			if a := p.moved(move); a.lowest < far {
				f(a, second)
			}
		}
	}
}

// touch returns the first contact of a side when the second gear turns toward it.
func (m rollMesh) touch(side rollSide, angle float64) contact {
	s := search{best: contact{turn: math.Inf(1)}, limit: math.Pi / float64(m.second.Teeth())}
	m.facing(side, angle, 0, func(a rollPiece, second []rollPiece) {
		for _, b := range second {
			s.meet(a, b)
		}
	})
	return s.best
}

// clearance returns the least distance of the sides that face each other, the
// second gear standing in the middle of its play, mm. Where there is no play it is
// by how much each side would have to give way along the normal where they
// touch when turned apart, negative.
func (m rollMesh) clearance(s stand) float64 {
	if s.play() <= 0 {
		return s.play() / 2 * s.lever
	}
	middle := (s.forward + s.backward) / 2
	best := math.Inf(1)
	for _, side := range [...]rollSide{m.down, m.up} {
		m.facing(side, s.angle, middle, func(a rollPiece, second []rollPiece) {
			for _, b := range second {
				best = clearance(a, b, best)
			}
		})
	}
	return best
}
