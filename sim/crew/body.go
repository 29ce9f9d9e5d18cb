package crew

import (
	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// Point is the motion of a point of the body in habitat components.
type Point struct {
	frame.State
	Acc r3.Vec // m/s^2, relative to the habitat
}

// Point gives the motion of the point at a height (m) above the feet, along
// the body, and at a reach from that line in the local directions (m). The
// body stands along the radius through the feet and turns with it:
//
//	p   = q e_out + s e_spin + z,  q = R - height
//	p'  = (q' - s phi') e_out + q phi' e_spin + z'
//	p'' = (q'' - q phi'^2 - s phi'') e_out + (2 q' phi' + q phi'' - s phi'^2) e_spin + z''
//
// with q' less the rate at which the height grows (cylindrical components, Kleppner & Kolenkow, An Introduction to Mechanics,
// section 1.9; from memory). q may be negative: beyond the axis.
func (f *Feet) Point(reach model.Reach) Point {
	return f.point(reach, motion{x: reach.Height})
}

// Body gives the motion of a point of the trunk, at a height (m) above the
// feet when the person stands: it sinks and rises with sitting and standing.
func (f *Feet) Body(height float64) Point {
	return f.point(model.Reach{}, motion{x: height - f.low.x, v: -f.low.v, a: -f.low.a})
}

// Local gives the directions by which the body stands: those at the feet, or
// of the flat floor.
func (f *Feet) Local() frame.Local {
	if f.flat != nil {
		return f.flat.Local()
	}
	return frame.LocalAt(f.Phi)
}

// OnFlat says whether the body stands along the normal of a flat floor.
func (f *Feet) OnFlat() bool { return f.flat != nil }

// point is the point at a reach, its height moving as given.
func (f *Feet) point(reach model.Reach, height motion) Point {
	if f.HeadFirst {
		height = motion{-height.x, -height.v, -height.a}
	}
	l := frame.LocalAt(f.Phi)
	if f.flat != nil {
		return f.upright(l, reach, height)
	}
	q, vq, aq, s := f.R-height.x, f.VR-height.v, f.AR-height.a, reach.Spinward
	return Point{
		State: frame.State{
			Pos: l.Vec(s, f.Z+reach.Axial, -q),
			Vel: l.Vec(q*f.VPhi, f.VZ, -(vq - s*f.VPhi)),
		},
		Acc: l.Vec(2*vq*f.VPhi+q*f.APhi-s*f.VPhi*f.VPhi, f.AZ, -(aq - q*f.VPhi*f.VPhi - s*f.APhi)),
	}
}

// upright is the point of a body that stands along the normal of a flat floor,
// and does not turn: it moves as the feet do, whose local directions are l.
func (f *Feet) upright(l frame.Local, reach model.Reach, height motion) Point {
	floor := f.flat.Local()
	return Point{
		State: frame.State{
			Pos: r3.Add(frame.Polar{R: f.R, Phi: f.Phi, Z: f.Z}.Vec(), floor.Vec(reach.Spinward, reach.Axial, height.x)),
			Vel: r3.Add(l.Vec(f.R*f.VPhi, f.VZ, -f.VR), floor.Vec(0, 0, height.v)),
		},
		Acc: r3.Add(l.Vec(2*f.VR*f.VPhi+f.R*f.APhi, f.AZ, f.R*f.VPhi*f.VPhi-f.AR), floor.Vec(0, 0, height.a)),
	}
}

// Support gives the specific force, m/s^2 in habitat components, that the
// structure must give to a point of the body for it to move so:
//
//	f = a' + 2 omega x v' + omega x (omega x r) + domega/dt x r
//
// (Taylor, Classical Mechanics, eq. 9.34, solved for the force; from memory).
// Apparent gravity is -f.
func Support(a *frame.Attitude, p Point) r3.Vec {
	return r3.Sub(p.Acc, a.Apparent(p.State).Sum())
}
