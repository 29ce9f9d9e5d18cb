package plots

import (
	"errors"
	"fmt"
	"math"
)

// InertialViewSpec is what InertialView draws: one release in the inertial frame, seen
// from the +axial end. Places are in m about the spin axis. The view turns all of them
// so that the plumb line at release points down the sheet.
type InertialViewSpec struct {
	Title, Desc, Notes string // Desc is for readers who cannot see the figure; Notes may be empty

	Spin         float64      // rad/s; positive turns counterclockwise
	Outlines     []Outline    // section of the structure in the habitat frame; without any, the deck's circle is drawn
	Foot         Point        // foot of the release's plumb line on the deck beneath, in the habitat frame
	ReleaseAngle float64      // rad by which the habitat is turned, counterclockwise, at release
	LandingAngle float64      // rad by which it is turned at the landing, or where the path ends; laps count
	Path         []TrackPoint // inertial frame, from release to landing; T never decreases
	TickEvery    float64      // s between time marks; 0 picks 1, 2 or 5 times a power of ten
	Body         float64      // m, radius of the body; 0 for a point
	Landing      *Point       // inertial frame, the body's centre at the landing; nil for none
	Surface      string       // what it lands on
	Offset       float64      // m, deck offset, spinward positive; NaN for none
	Flat         bool         // the deck beneath is flat: the offset is said in words
	Height       float64      // m, of the release above a flat deck, along its normal
}

func (s InertialViewSpec) check() error {
	if s.Body < 0 {
		return fmt.Errorf("the body's radius is %g m", s.Body)
	}
	if err := checkSizes(s.Body, orZero(s.Offset), s.Height); err != nil {
		return err
	}
	if err := checkPlaces([]Point{s.Foot}, s.Landing); err != nil {
		return err
	}
	if s.Foot.norm() == 0 {
		return errors.New("the foot of the plumb line is at the axis")
	}
	const most = 1e6 // rad: the digits of an angle end somewhere
	if !(math.Abs(s.ReleaseAngle) <= most) || !(math.Abs(s.LandingAngle) <= most) {
		return fmt.Errorf("the habitat is turned by %g and %g rad", s.ReleaseAngle, s.LandingAngle)
	}
	return checkOutlines(s.Outlines)
}

// InertialView draws one release as someone sees it who does not turn with the habitat.
// It is an error if a number cannot be drawn or the path is empty.
func InertialView(spec InertialViewSpec) (*Figure, error) {
	s, err := newInertial(spec)
	if err != nil {
		return nil, fmt.Errorf("inertial view: %w", err)
	}
	s.arrange()
	return newFigure(spec.Title, spec.Desc, s.w, s.h, s.paint)
}
