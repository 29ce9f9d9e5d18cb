package motion

import (
	"encoding/base64"
	"encoding/binary"
	"errors"
	"math"
)

// A film keeps the track within fineness of its extent, and grows coarser where it would take
// more than packBudget: 200 films then weigh a few megabytes. Beyond coarseness the picture
// would show it, and the end of the track is left out instead.
const (
	fineness   = 1e-7
	coarseness = 1e-4
	packBudget = 8_000 // bytes, before base64 adds a third
)

// turnBetween is the angle about the axis, rad, that neighbouring knots may be apart: the
// player sums the angle gone round from knot to knot, which holds below half a turn.
const turnBetween = 2.0

// reel is a track packed.
type reel struct {
	spin             float64
	pieces           []packedPiece
	posErr, velErr   float64 // m and m/s, the greatest found
	end              float64 // s
	cut              bool    // the end of the track is left out
	extent, quickest float64 // m and m/s, in the habitat frame
}

// packedPiece is a piece as the player gets it: a state at its start, in the inertial frame or
// in the one that turns, and departures from the uniform motion that begins there.
type packedPiece struct {
	t0, t1  float64
	phase   int
	turning bool
	base    [6]float64
	knots   []knot // none: uniform motion; else the first is at t0 and the last at t1
}

// knot is time since the piece's start, departure of place and of velocity. It is written as
// floats by which it differs from the knot before: 32 bits then do for what a piece departs by
// from knot to knot, not in all.
type knot struct {
	at [7]float64
	by [7]float32
}

const (
	headBytes = 11 * 8
	knotBytes = 7 * 4
)

// pack makes the reel of a film that has been checked.
func pack(f *Film) (*reel, error) {
	r := &reel{spin: f.Spin, end: f.end()}
	r.extent, r.quickest = f.reach()
	for fine := fineness; ; fine *= 4 {
		r.pieces, r.posErr, r.velErr = nil, 0, 0
		for i := range f.Pieces {
			r.add(&f.Pieces[i], fine)
		}
		if r.bytes() <= packBudget {
			return r, nil
		}
		if fine > coarseness {
			return r, r.shorten()
		}
	}
}

// reach gives the extent of a track from its release, m, and its greatest speed, m/s, in the
// habitat frame; neither is 0.
func (f *Film) reach() (extent, quickest float64) {
	first := turned(f.Spin, f.Pieces[0].States[0])
	for i := range f.Pieces {
		for _, s := range f.Pieces[i].States {
			h := turned(f.Spin, s)
			extent = math.Max(extent, dist3(h.Pos, first.Pos))
			quickest = math.Max(quickest, dist3(h.Vel, [3]float64{}))
		}
	}
	const least = 1e-6 // m and m/s: what does not move has no extent
	return math.Max(extent, least), math.Max(quickest, least)
}

func (r *reel) bytes() int {
	n := 0
	for i := range r.pieces {
		n += headBytes + knotBytes*len(r.pieces[i].knots)
	}
	return n
}

// add packs a piece in the frame in which it takes less.
func (r *reel) add(p *Piece, fine float64) {
	still, sp, sv := packPiece(r.spin, p, false, fine*r.extent, fine*r.quickest)
	turns, tp, tv := packPiece(r.spin, p, true, fine*r.extent, fine*r.quickest)
	if len(turns.knots) < len(still.knots) || len(turns.knots) == len(still.knots) && p.Phase != "flight" {
		still, sp, sv = turns, tp, tv
	}
	r.pieces = append(r.pieces, still)
	r.posErr, r.velErr = math.Max(r.posErr, sp), math.Max(r.velErr, sv)
}

// shorten drops pieces from the end until the rest fits.
func (r *reel) shorten() error {
	for len(r.pieces) > 1 && r.bytes() > packBudget {
		r.pieces = r.pieces[:len(r.pieces)-1]
	}
	if r.bytes() > 4*packBudget {
		return errors.New("a single piece of the track is too long for a film")
	}
	r.end, r.cut = r.pieces[len(r.pieces)-1].t1, true
	return nil
}

// packPiece chooses knots among the states such that all others are met within the
// tolerances, m and m/s, and gives the errors that are left.
func packPiece(spin float64, p *Piece, turning bool, tolPos, tolVel float64) (out packedPiece, posErr, velErr float64) {
	states := p.States
	if turning {
		states = make([]State, len(p.States))
		for i, s := range p.States {
			states[i] = turned(spin, s)
		}
	}
	n := len(states)
	out = packedPiece{t0: states[0].T, t1: states[n-1].T, phase: phaseCode(p.Phase), turning: turning}
	copy(out.base[:3], states[0].Pos[:])
	copy(out.base[3:], states[0].Vel[:])
	posErr, velErr, _ = out.errors(states)
	if posErr <= tolPos && velErr <= tolVel && turnOf(states[0], states[n-1]) <= turnBetween {
		return out, posErr, velErr
	}
	c := chooser{out: &out, states: states, tolPos: tolPos, tolVel: tolVel}
	out.knots = append(out.knots, out.knotAt(states[0], knot{}))
	c.choose(0, n-1)
	return out, c.posErr, c.velErr
}

// knotAt is a state as a departure from the uniform motion, after another knot.
func (p *packedPiece) knotAt(s State, after knot) (k knot) {
	u := s.T - p.t0
	k.at[0] = u
	for i := range 3 {
		k.at[1+i] = s.Pos[i] - p.base[i] - p.base[3+i]*u
		k.at[4+i] = s.Vel[i] - p.base[3+i]
	}
	for i, v := range k.at {
		k.by[i] = float32(v - after.at[i])
		k.at[i] = after.at[i] + float64(k.by[i])
	}
	return k
}

// errors gives the greatest errors at states, and where the error of the place is greatest.
func (p *packedPiece) errors(states []State) (pos, vel float64, worst int) {
	for i, s := range states {
		q, v := p.at(s.T)
		if d := dist3(q, s.Pos); d > pos {
			pos, worst = d, i
		}
		vel = math.Max(vel, dist3(v, s.Vel))
	}
	return pos, vel, worst
}

// chooser halves a stretch of states until a polynomial between its ends meets them.
type chooser struct {
	out            *packedPiece
	states         []State
	tolPos, tolVel float64
	posErr, velErr float64
}

// choose adds the knots after lo up to hi.
func (c *chooser) choose(lo, hi int) {
	a := c.out.knots[len(c.out.knots)-1] // at lo
	b := c.out.knotAt(c.states[hi], a)
	trial := packedPiece{t0: c.out.t0, t1: c.out.t1, base: c.out.base, knots: []knot{a, b}}
	pos, vel, _ := trial.errors(c.states[lo : hi+1])
	met := pos <= c.tolPos && vel <= c.tolVel && turnOf(c.states[lo], c.states[hi]) <= turnBetween
	if met || hi-lo < 2 {
		c.out.knots = append(c.out.knots, b)
		c.posErr, c.velErr = math.Max(c.posErr, pos), math.Max(c.velErr, vel)
		return
	}
	c.choose(lo, c.middle(lo, hi))
	c.choose(c.middle(lo, hi), hi)
}

// middle is the state nearest the middle of the time between two.
func (c *chooser) middle(lo, hi int) int {
	half := (c.states[lo].T + c.states[hi].T) / 2
	k := lo + 1
	for k < hi-1 && c.states[k].T < half {
		k++
	}
	return k
}

// encode writes the pieces as the player reads them: little-endian, a head of doubles (t0, t1,
// phase, turning, number of knots, base) and the knots' differences as floats.
func (r *reel) encode() string {
	var b []byte
	double := func(v float64) { b = binary.LittleEndian.AppendUint64(b, math.Float64bits(v)) }
	for i := range r.pieces {
		p := &r.pieces[i]
		turning := 0.0
		if p.turning {
			turning = 1
		}
		for _, v := range append([]float64{p.t0, p.t1, float64(p.phase), turning, float64(len(p.knots))}, p.base[:]...) {
			double(v)
		}
		for _, k := range p.knots {
			for _, v := range k.by {
				b = binary.LittleEndian.AppendUint32(b, math.Float32bits(v))
			}
		}
	}
	return base64.StdEncoding.EncodeToString(b)
}
