package integrator

// row is one linear combination of stages, its zeros left out.
type row struct {
	j []int     // stages
	a []float64 // their coefficients
}

// newRow keeps the coefficients that are not zero.
func newRow(coef []float64) row {
	var r row
	for j, a := range coef {
		if a != 0 {
			r.j = append(r.j, j)
			r.a = append(r.a, a)
		}
	}
	return r
}

// add sets dst = y + h sum a_j k_j. Up to six terms, the most that a row of
// DormandPrince54 has, take one pass with the slices held to one length, which
// spares the bounds checks; more take a pass each.
func (r *row) add(dst, y []float64, h float64, k [][]float64) {
	n := len(dst)
	y = y[:n]
	switch len(r.a) {
	case 1:
		a, p := r.a[0], k[r.j[0]][:n]
		for i := range dst {
			dst[i] = y[i] + h*(a*p[i])
		}
	case 2:
		r.add2(dst, y, h, k)
	case 3:
		r.add3(dst, y, h, k)
	case 4:
		r.add4(dst, y, h, k)
	case 5:
		r.add5(dst, y, h, k)
	case 6:
		r.add6(dst, y, h, k)
	default:
		r.addMany(dst, y, h, k)
	}
}

func (r *row) add2(dst, y []float64, h float64, k [][]float64) {
	n := len(dst)
	a := (*[2]float64)(r.a)
	j := (*[2]int)(r.j)
	y, p, q := y[:n], k[j[0]][:n], k[j[1]][:n]
	a0, a1 := h*a[0], h*a[1]
	for i := range dst {
		dst[i] = y[i] + (a0*p[i] + a1*q[i])
	}
}

func (r *row) add3(dst, y []float64, h float64, k [][]float64) {
	n := len(dst)
	a := (*[3]float64)(r.a)
	j := (*[3]int)(r.j)
	y, p, q, s := y[:n], k[j[0]][:n], k[j[1]][:n], k[j[2]][:n]
	a0, a1, a2 := h*a[0], h*a[1], h*a[2]
	for i := range dst {
		dst[i] = y[i] + (a0*p[i] + a1*q[i] + a2*s[i])
	}
}

func (r *row) add4(dst, y []float64, h float64, k [][]float64) {
	n := len(dst)
	a := (*[4]float64)(r.a)
	j := (*[4]int)(r.j)
	y, p, q, s, u := y[:n], k[j[0]][:n], k[j[1]][:n], k[j[2]][:n], k[j[3]][:n]
	a0, a1, a2, a3 := h*a[0], h*a[1], h*a[2], h*a[3]
	for i := range dst {
		dst[i] = y[i] + (a0*p[i] + a1*q[i] + a2*s[i] + a3*u[i])
	}
}

func (r *row) add5(dst, y []float64, h float64, k [][]float64) {
	n := len(dst)
	a := (*[5]float64)(r.a)
	j := (*[5]int)(r.j)
	y, p, q, s, u := y[:n], k[j[0]][:n], k[j[1]][:n], k[j[2]][:n], k[j[3]][:n]
	v := k[j[4]][:n]
	a0, a1, a2, a3, a4 := h*a[0], h*a[1], h*a[2], h*a[3], h*a[4]
	for i := range dst {
		dst[i] = y[i] + (a0*p[i] + a1*q[i] + a2*s[i] + a3*u[i] + a4*v[i])
	}
}

func (r *row) add6(dst, y []float64, h float64, k [][]float64) {
	n := len(dst)
	a := (*[6]float64)(r.a)
	j := (*[6]int)(r.j)
	y, p, q, s, u := y[:n], k[j[0]][:n], k[j[1]][:n], k[j[2]][:n], k[j[3]][:n]
	v, w := k[j[4]][:n], k[j[5]][:n]
	a0, a1, a2, a3, a4, a5 := h*a[0], h*a[1], h*a[2], h*a[3], h*a[4], h*a[5]
	for i := range dst {
		dst[i] = y[i] + (a0*p[i] + a1*q[i] + a2*s[i] + a3*u[i] + a4*v[i] + a5*w[i])
	}
}

func (r *row) addMany(dst, y []float64, h float64, k [][]float64) {
	copy(dst, y)
	for m, j := range r.j {
		a := h * r.a[m]
		for i, v := range k[j][:len(dst)] {
			dst[i] += a * v
		}
	}
}
