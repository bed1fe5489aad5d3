package exact

import "context"

// commutator evaluates D psi by Horner's scheme, with A = a R1, B, C, E the sums
// that stand in three, two, one and no commutators with H, phi_k = H^k psi:
//
//	D psi = H (H (H A phi_0 - 3 A phi_1 + B phi_0)
//	           + 3 A phi_2 - 2 B phi_1 + C phi_0 - q R1^2 phi_0)
//	        - A phi_3 + B phi_2 - C phi_1 + E phi_0 + q (2 R1 H R1 phi_0 - R1^2 phi_1)
//
// with q the factor of [R1, [H, R1]]. All factors are real or imaginary.
type commutator struct {
	*run
	*estimate
	a, b, c, e, q complex128

	phi, inner, low, high vector
}

// power sets phi = H^k psi.
func (d *commutator) power(ctx context.Context, k int) error {
	return d.propagator.PowerTo(ctx, d.phi, k)
}

func (d *commutator) apply(ctx context.Context, dst, x vector) error {
	_, err := d.hamiltonian.product(ctx, dst, x)
	return err
}

// norm returns |D psi|.
func (d *commutator) norm(ctx context.Context) (float64, error) {
	for _, stage := range []func(context.Context) error{d.innermost, d.middle, d.outermost} {
		if err := stage(ctx); err != nil {
			return 0, err
		}
	}
	return norm(d.low), nil
}

// innermost sets inner = H R1 phi_0 and low to what the second H acts on.
func (d *commutator) innermost(ctx context.Context) error {
	clearVector(d.phi)
	addTimes(d.phi, d.psi, d.r1, 1)
	if err := d.apply(ctx, d.inner, d.phi); err != nil {
		return err
	}
	if err := d.power(ctx, 1); err != nil {
		return err
	}
	clearVector(d.low)
	addMultiple(d.low, d.inner, d.a)
	addTimes(d.low, d.phi, d.r1, -3*d.a)
	addTimes(d.low, d.psi, d.twice, d.b)
	return nil
}

// middle sets high to what the last H acts on. It starts with phi = phi_1.
func (d *commutator) middle(ctx context.Context) error {
	if err := d.apply(ctx, d.high, d.low); err != nil {
		return err
	}
	addTimes(d.high, d.phi, d.twice, -2*d.b)
	addTimes(d.high, d.psi, d.once, d.c)
	addSquare(d.high, d.psi, d.r1, -d.q)
	if err := d.power(ctx, 2); err != nil {
		return err
	}
	addTimes(d.high, d.phi, d.r1, 3*d.a)
	return nil
}

// outermost sets low to D psi. It starts with phi = phi_2.
func (d *commutator) outermost(ctx context.Context) error {
	if err := d.apply(ctx, d.low, d.high); err != nil {
		return err
	}
	addTimes(d.low, d.phi, d.twice, d.b)
	addTimes(d.low, d.inner, d.r1, 2*d.q)
	addTimes(d.low, d.psi, d.none, d.e)
	if err := d.power(ctx, 1); err != nil {
		return err
	}
	addTimes(d.low, d.phi, d.once, -d.c)
	addMultiple(d.low, d.phi, d.e*complex(d.g[4], 0))
	addSquare(d.low, d.phi, d.r1, -d.q)
	if err := d.power(ctx, 3); err != nil {
		return err
	}
	addTimes(d.low, d.phi, d.r1, -d.a)
	return nil
}

func clearVector(v vector) {
	clear(v.Re)
	clear(v.Im)
}
