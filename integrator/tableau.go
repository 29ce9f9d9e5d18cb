package integrator

import "fmt"

// Tableau holds the coefficients of an explicit embedded Runge-Kutta pair of
// s stages with a continuous extension:
//
//	k_i    = f(t + C_i h, y + h sum_{j<i} A_ij k_j)
//	y1     = y + h sum_i B_i k_i
//	error  = h sum_i E_i k_i
//	y(t + theta h) = y + h sum_i (sum_j P_ij theta^(j+1)) k_i
//
// It is data: the stepper knows nothing of a method but its tableau.
type Tableau struct {
	Name     string
	Source   string      // where the coefficients were published
	Order    int         // of y1
	ErrOrder int         // of the embedded solution, B - E
	FSAL     bool        // first same as last: the last stage is f(t + h, y1), and serves the next step
	C        []float64   // s nodes
	B        []float64   // s weights of y1
	E        []float64   // s weights of the error, B less those of the embedded solution
	A        [][]float64 // s rows; row i holds i coefficients
	P        [][]float64 // s rows, of one coefficient for each power of theta from 1 up
}

// check returns what is wrong with the shape of the tableau.
func (tab *Tableau) check() error {
	s := len(tab.B)
	if s == 0 || len(tab.C) != s || len(tab.E) != s || len(tab.A) != s || len(tab.P) != s {
		return fmt.Errorf("integrator: tableau %q: C, B, E, A and P differ in length or are empty", tab.Name)
	}
	if tab.Order < 1 || tab.ErrOrder < 1 || len(tab.P[0]) == 0 {
		return fmt.Errorf("integrator: tableau %q: has no order or no dense output", tab.Name)
	}
	if len(tab.P[0]) > maxDegree {
		return fmt.Errorf("integrator: tableau %q: dense output of degree above %d", tab.Name, maxDegree)
	}
	for i := range s {
		if len(tab.A[i]) != i || len(tab.P[i]) != len(tab.P[0]) {
			return fmt.Errorf("integrator: tableau %q: row %d of A or P has the wrong length", tab.Name, i)
		}
	}
	if tab.FSAL && !tab.lastIsEnd() {
		return fmt.Errorf("integrator: tableau %q: its last stage is not at the end of the step", tab.Name)
	}
	return nil
}

// lastIsEnd reports whether the last stage is f(t + h, y1).
func (tab *Tableau) lastIsEnd() bool {
	s := len(tab.B)
	if s < 2 || tab.C[s-1] != 1 || tab.B[s-1] != 0 {
		return false
	}
	for j, a := range tab.A[s-1] {
		if a != tab.B[j] {
			return false
		}
	}
	return true
}

// DormandPrince54 is the pair of orders 5 and 4 of Dormand & Prince, a family
// of embedded Runge-Kutta formulae, J. Comp. Appl. Math. 6 (1980) 19-26, with
// the continuous extension of order 4 given by Shampine, Some practical
// Runge-Kutta formulas, Math. Comp. 46 (1986) 135-150, and Hairer, Norsett &
// Wanner, Solving Ordinary Differential Equations I, section II.6. All from
// memory: the order conditions in the tests prove them.
func DormandPrince54() *Tableau {
	return &Tableau{
		Name:     "Dormand-Prince 5(4)",
		Source:   "Dormand & Prince 1980; dense output Shampine 1986, Hairer, Norsett & Wanner II.6 (from memory)",
		Order:    5,
		ErrOrder: 4,
		FSAL:     true,
		C:        []float64{0, 1. / 5, 3. / 10, 4. / 5, 8. / 9, 1, 1},
		A: [][]float64{
			{},
			{1. / 5},
			{3. / 40, 9. / 40},
			{44. / 45, -56. / 15, 32. / 9},
			{19372. / 6561, -25360. / 2187, 64448. / 6561, -212. / 729},
			{9017. / 3168, -355. / 33, 46732. / 5247, 49. / 176, -5103. / 18656},
			{35. / 384, 0, 500. / 1113, 125. / 192, -2187. / 6784, 11. / 84},
		},
		B: []float64{35. / 384, 0, 500. / 1113, 125. / 192, -2187. / 6784, 11. / 84, 0},
		E: []float64{71. / 57600, 0, -71. / 16695, 71. / 1920, -17253. / 339200, 22. / 525, -1. / 40},
		P: [][]float64{
			{1, -8048581381. / 2820520608, 8663915743. / 2820520608, -12715105075. / 11282082432},
			{0, 0, 0, 0},
			{0, 131558114200. / 32700410799, -68118460800. / 10900136933, 87487479700. / 32700410799},
			{0, -1754552775. / 470086768, 14199869525. / 1410260304, -10690763975. / 1880347072},
			{0, 127303824393. / 49829197408, -318862633887. / 49829197408, 701980252875. / 199316789632},
			{0, -282668133. / 205662961, 2019193451. / 616988883, -1453857185. / 822651844},
			{0, 40617522. / 29380423, -110615467. / 29380423, 69997945. / 29380423},
		},
	}
}
