package air_test

import "math"

// The laws below are other authors' fits of the drag coefficient of a smooth
// sphere, as the general-purpose library fluids (C. Bell) prints them (from
// memory; TestOtherLawsAsPrinted holds them to its documented values).

// haiderLevenspiel is the fit of Haider & Levenspiel 1989 for a sphere, to
// 2.6e5.
func haiderLevenspiel(re float64) float64 {
	return 24/re*(1+0.1806*math.Pow(re, 0.6459)) + 0.4251/(1+6880.95/re)
}

// morrison is the fit of Morrison, An Introduction to Fluid Mechanics 2013, to
// 1e6.
func morrison(re float64) float64 {
	crisis := re / 263000
	return 24/re + 2.6*(re/5)/(1+math.Pow(re/5, 1.52)) +
		0.411*math.Pow(crisis, -7.94)/(1+math.Pow(crisis, -8)) + math.Pow(re, 0.80)/461000
}

// barati is the fit of Barati, Neyshabouri & Ahmadi 2014, eq. for Re < 2e5.
func barati(re float64) float64 {
	return 5.4856e9*math.Tanh(4.3774e-9/re) + 0.0709*math.Tanh(700.6574/re) +
		0.3894*math.Tanh(74.1539/re) - 0.1198*math.Tanh(7429.0843/re) +
		1.7174*math.Tanh(9.9851/(re+2.3384)) + 0.4744
}

// clift is the piece for 20 < Re < 260 of the recommended curve of Clift,
// Grace & Weber 1978.
func clift(re float64) float64 { return 24 / re * (1 + 0.1935*math.Pow(re, 0.6305)) }
