package motion

import (
	"math"
	"sort"

	"offplumb/plots"
)

func dist3(a, b [3]float64) float64 {
	x, y, z := a[0]-b[0], a[1]-b[1], a[2]-b[2]
	return math.Sqrt(x*x + y*y + z*z)
}

// rotate turns a vector about the axis by an angle, rad, counterclockwise.
func rotate(v [3]float64, a float64) [3]float64 {
	sin, cos := math.Sincos(a)
	return [3]float64{cos*v[0] - sin*v[1], sin*v[0] + cos*v[1], v[2]}
}

// turned is an inertial state in the habitat frame: v' = v - omega x r.
func turned(spin float64, s State) State {
	rel := [3]float64{s.Vel[0] + spin*s.Pos[1], s.Vel[1] - spin*s.Pos[0], s.Vel[2]}
	return State{s.T, rotate(s.Pos, -spin*s.T), rotate(rel, -spin*s.T)}
}

// still is the inverse of turned.
func still(spin float64, s State) State {
	pos, vel := rotate(s.Pos, spin*s.T), rotate(s.Vel, spin*s.T)
	vel[0] -= spin * pos[1]
	vel[1] += spin * pos[0]
	return State{s.T, pos, vel}
}

// turnOf is the angle about the axis between two places, rad, less than half a turn.
func turnOf(a, b State) float64 { return math.Abs(angle(a.Pos, b.Pos)) }

func angle(a, b [3]float64) float64 {
	return math.Atan2(a[0]*b[1]-a[1]*b[0], a[0]*b[0]+a[1]*b[1])
}

// at gives place and velocity at a time within the piece, in the piece's own frame: the
// uniform motion, and on it the cubic Hermite polynomial between two knots (textbook).
func (p *packedPiece) at(t float64) (pos, vel [3]float64) {
	u := t - p.t0
	for i := range 3 {
		pos[i], vel[i] = p.base[i]+p.base[3+i]*u, p.base[3+i]
	}
	if len(p.knots) == 0 {
		return pos, vel
	}
	k := p.interval(u)
	a, b := &p.knots[k].at, &p.knots[min(k+1, len(p.knots)-1)].at
	h := b[0] - a[0]
	w := 0.0
	if h > 0 {
		w = math.Max(0, math.Min(1, (u-a[0])/h))
	}
	for i := range 3 {
		d, dv := hermite(a[1+i], b[1+i], a[4+i], b[4+i], h, w)
		pos[i] += d
		vel[i] += dv
	}
	return pos, vel
}

// interval is the knot that begins the interval of time u.
func (p *packedPiece) interval(u float64) int {
	k := sort.Search(len(p.knots), func(i int) bool { return p.knots[i].at[0] >= u }) - 1
	return max(0, min(k, len(p.knots)-2))
}

// hermite gives the cubic with values a, b and slopes va, vb at the ends of an interval of
// length h, and its slope, at the fraction w.
func hermite(a, b, va, vb, h, w float64) (value, slope float64) {
	w2 := w * w
	w3 := w2 * w
	value = (2*w3-3*w2+1)*a + (3*w2-2*w3)*b + h*((w3-2*w2+w)*va+(w3-w2)*vb)
	slope = (3*w2-4*w+1)*va + (3*w2-2*w)*vb
	if h > 0 {
		slope += 6 * (w2 - w) * (a - b) / h
	}
	return value, slope
}

// at gives the inertial state at a time, the earlier piece at a joint, held at the ends.
func (r *reel) at(t float64) (State, int) {
	n := len(r.pieces)
	k := sort.Search(n, func(i int) bool { return r.pieces[i].t1 >= t })
	if t >= r.end {
		k = n - 1
	}
	k = min(k, n-1)
	p := &r.pieces[k]
	t = math.Max(p.t0, math.Min(p.t1, t))
	pos, vel := p.at(t)
	s := State{t, pos, vel}
	if p.turning {
		s = still(r.spin, s)
	}
	return s, p.phase
}

// spot is where the body is on both drawings at a moment.
type spot struct {
	t             float64
	phase         int
	board, beyond plots.Point // m about the axis: in the habitat frame, in the inertial frame
}

func (r *reel) spot(t float64) spot {
	s, phase := r.at(t)
	h := turned(r.spin, s)
	return spot{t, phase, plots.Point{X: h.Pos[0], Y: h.Pos[1]}, plots.Point{X: s.Pos[0], Y: s.Pos[1]}}
}

// Drawn paths take about drawnSpots moments, spread over the time and over the pieces alike,
// and each turn of the habitat at least turnSpots of them.
const (
	drawnSpots = 600
	turnSpots  = 60
	mostSpots  = 6000
)

// times are the moments at which a path is drawn: the joints and between them.
func (r *reel) times() []float64 {
	points := math.Min(mostSpots, math.Max(drawnSpots, turnSpots*math.Abs(r.spin)*r.end/(2*math.Pi)))
	out := []float64{0}
	for i := range r.pieces {
		p := &r.pieces[i]
		n := 12
		if r.end > 0 {
			n += int(points * (p.t1 - p.t0) / r.end)
		}
		if p.t1 == p.t0 {
			n = 1
		}
		for k := 1; k <= n; k++ {
			out = append(out, p.t0+(p.t1-p.t0)*float64(k)/float64(n))
		}
	}
	return out
}

func (r *reel) spots() []spot {
	times := r.times()
	out := make([]spot, len(times))
	for i, t := range times {
		out[i] = r.spot(t)
	}
	return out
}

// Print is a film as a player has it: for those who hold films against tracks.
type Print struct {
	End                float64 // s
	PosError, VelError float64 // m and m/s, the greatest found at the states given
	reel               *reel
}

// NewPrint packs a film.
func NewPrint(f *Film) (*Print, error) {
	if err := f.check(); err != nil {
		return nil, err
	}
	r, err := pack(f)
	if err != nil {
		return nil, err
	}
	return &Print{End: r.end, PosError: r.posErr, VelError: r.velErr, reel: r}, nil
}

// At gives state and phase at a time, s since the release.
func (p *Print) At(t float64) (State, string) {
	s, phase := p.reel.at(t)
	return s, phaseNames[phase]
}
