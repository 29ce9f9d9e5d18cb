package measure

import (
	"math"

	"offplumb/sim/model"
)

// DeckFigure is what a deck is like to live on, under the spin at time 0; Last
// tells the same after the last change of the spin. SI units.
type DeckFigure struct {
	Deck            string
	Radius, Gravity float64
	Speed, Coriolis float64
	Drop            float64

	Pulled

	Changes                                        bool // the spin does
	LastGravity, LastSpeed, LastCoriolis, LastDrop float64
}

// dropHeight is the height, m, of the drop in decks.csv.
const dropHeight = 1

// DeckFigures works out the figures of each deck.
func DeckFigures(m *model.Model) []DeckFigure {
	out := make([]DeckFigure, len(m.Decks))
	for i := range m.Decks {
		r := m.Decks[i].Radius
		out[i] = DeckFigure{Deck: m.Decks[i].Name, Radius: r, Gravity: m.Gravity(r), Speed: m.Habitat.Spin * r,
			Coriolis: 2 * math.Abs(m.Habitat.Spin), Drop: DropOffset(r, dropHeight, m.Habitat.Spin)}
		out[i].Pulled = pulledOn(m, r, middleOf(&m.Decks[i]))
		last := m.SpinAt(m.Settled())
		d := &out[i]
		d.Changes = m.SpinChanges()
		d.LastGravity, d.LastSpeed, d.LastCoriolis, d.LastDrop = last*last*r, last*r, 2*math.Abs(last), DropOffset(r, dropHeight, last)
	}
	return out
}

// DropOffset is the deck offset, m, of a point dropped in vacuum from a height
// (m) over a floor of radius r (m): r inv(theta), cos(theta) = (r - height)/r,
// inv(theta) = tan(theta) - theta the involute function of the gear handbooks
// (ISO 21771:2007); against the spin. It is NaN without spin and from the axis
// or beyond.
func DropOffset(r, height, spin float64) float64 {
	if spin == 0 || height >= r {
		return math.NaN()
	}
	return -math.Copysign(r*Involute(height/r), spin)
}

// Involute gives tan(theta) - theta for the angle whose cosine is 1 - x,
// 0 <= x < 1. Below the crossover the difference would lose its digits, and
// the series in tan(theta) is summed instead: t - atan(t) = t^3/3 - t^5/5 + ...
func Involute(x float64) float64 {
	t := math.Sqrt(x*(2-x)) / (1 - x)
	if t > involuteSeries {
		return t - math.Atan(t)
	}
	sum, power := 0.0, t
	for k := 3.0; ; k += 2 {
		power *= -t * t
		next := sum - power/k
		if next == sum {
			return sum
		}
		sum = next
	}
}

// involuteSeries is the crossover of Involute: at 0.3 the difference of the
// closed form has lost a factor of 33 in accuracy and the series takes 15
// terms.
const involuteSeries = 0.3
