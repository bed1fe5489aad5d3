package eos

import "math"

// response returns X = sum_n (n+1) (p_n - p_(n+1)) / (h_(n+1) - h_n) in 1/Hz.
func (m *Atomic) response() float64 {
	sum := 0.0
	for n := range m.levels - 1 {
		x := m.beta * math.Abs(m.h[n+1]-m.h[n])
		sum += float64(n+1) * max(m.p[n], m.p[n+1]) * m.beta * thermal(x)
	}
	return sum
}

// thermal is (1 - exp(-x))/x for x >= 0.
func thermal(x float64) float64 {
	if x == 0 {
		return 1
	}
	return -math.Expm1(-x) / x
}

// bend is (thermal(x) - 1)/x, the derivative of the pair factor with respect to the
// energy of its lower state over beta^2 and the weight of that state.
func bend(x float64) float64 {
	if x < 1e-2 { // the next term is x^5/5040
		return -1./2 + x*(1./6-x*(1./24-x*(1./120-x/720)))
	}
	return (thermal(x) - 1) / x
}

// secondOrder returns K and sets d to its derivatives.
//
// A hop leads from a pair of sites (m, n) to (m+1, n-1), U(m-n+1) higher. With q the
// product of the probabilities, the pair factor (q - q')/(E' - E) is written through
// the lower of both states so that nothing overflows:
//
//	F = q_low beta thermal(x)    dF/dE_low = q_low beta^2 bend(x)
//	dF/dE_high = -q_low beta^2 (thermal(x) - exp(-x))/x       x = beta |E' - E|
//
// Both weights carry 1/Z of one site each, which adds beta p_k F to dF/dh_k.
func (m *Atomic) secondOrder() float64 {
	for k := range m.levels {
		x := m.beta * m.u * float64(k)
		m.f[k] = m.beta * thermal(x)
		m.low[k] = m.beta * m.beta * bend(x)
		m.high[k] = -m.beta*m.f[k] - m.low[k] // both add up to dF/dE at equal shifts, -beta F
		m.d[k] = 0
	}
	sum := 0.0
	for a := range m.levels - 1 {
		for b := 1; b < m.levels; b++ {
			q, other := m.p[a]*m.p[b], m.p[a+1]*m.p[b-1]
			if q < 1e-30 && other < 1e-30 {
				continue
			}
			c, step := float64((a+1)*b), a-b+1
			from, to := a, a+1 // the lower state has from atoms on this site
			if step < 0 {
				q, step, from, to = other, -step, to, from
			}
			sum += c * q * m.f[step]
			m.d[from] += c * q * m.low[step]
			m.d[to] += c * q * m.high[step]
		}
	}
	for k := range m.levels {
		m.d[k] += m.beta * m.p[k] * sum
	}
	return sum
}
