package exact

import (
	"context"
	"math"
)

// commutator evaluates, with phi_k = H^k psi and t = 2 pi h,
//
//	Q psi = H (i t^3/2880 (H R1 phi_0 - 2 R1 phi_1) + t^2/480 R2 phi_0)
//	        + i t^3/2880 R1 phi_2 - t^2/480 R2 phi_1 + i t/1440 (g3 phi_1 + R3 phi_0)
//	S psi = H (-i t^3/8640 (g1 (H R1 phi_0 - 2 R1 phi_1) - R1^2 phi_0) - t^2/1440 g1 R2 phi_0)
//	        - i t^3/8640 (g1 R1 phi_2 + 2 R1 H R1 phi_0 - R1^2 phi_1)
//	        + t^2/1440 (g1 R2 phi_1 + g2 (H R1 phi_0 - R1 phi_1)) + i t/120 (g4 phi_1 + R4 phi_0)
type commutator struct {
	*run
	*estimate
	theta float64

	phi1, inner vector // inner = H R1 phi_0
	left, right vector
}

// defect returns |Q psi| and |S psi|.
func (c *commutator) defect(ctx context.Context) (d defect, err error) {
	clearVector(c.left)
	addTimes(c.left, c.psi, c.r1, 1)
	if _, err = c.hamiltonian.product(ctx, c.inner, c.left); err != nil {
		return d, err
	}
	if err = c.propagator.PowerTo(ctx, c.phi1, 1); err != nil {
		return d, err
	}
	if err = c.returning(ctx); err != nil {
		return d, err
	}
	d.returning = norm(c.right)
	if err = c.staying(ctx); err != nil {
		return d, err
	}
	d.staying = norm(c.right)
	return d, nil
}

// apply sets right = H left and then left = phi_2.
func (c *commutator) apply(ctx context.Context) error {
	if _, err := c.hamiltonian.product(ctx, c.right, c.left); err != nil {
		return err
	}
	return c.propagator.PowerTo(ctx, c.left, 2)
}

// returning sets right = Q psi.
func (c *commutator) returning(ctx context.Context) error {
	third := complex(0, math.Pow(c.theta, 3)/2880)
	second := complex(c.theta*c.theta/480, 0)
	first := complex(0, c.theta/1440)
	clearVector(c.left)
	addMultiple(c.left, c.inner, third)
	addTimes(c.left, c.phi1, c.r1, -2*third)
	addTimes(c.left, c.psi, c.r2, second)
	if err := c.apply(ctx); err != nil {
		return err
	}
	addTimes(c.right, c.left, c.r1, third)
	addTimes(c.right, c.phi1, c.r2, -second)
	addMultiple(c.right, c.phi1, first*complex(c.g[3], 0))
	addTimes(c.right, c.psi, c.r3, first)
	return nil
}

// staying sets right = S psi.
func (c *commutator) staying(ctx context.Context) error {
	third := complex(0, -math.Pow(c.theta, 3)/8640)
	second := complex(c.theta*c.theta/1440, 0)
	first := complex(0, c.theta/120)
	g1, g2, g4 := complex(c.g[1], 0), complex(c.g[2], 0), complex(c.g[4], 0)
	clearVector(c.left)
	addMultiple(c.left, c.inner, third*g1)
	addTimes(c.left, c.phi1, c.r1, -2*third*g1)
	addSquare(c.left, c.psi, c.r1, -third)
	addTimes(c.left, c.psi, c.r2, -second*g1)
	if err := c.apply(ctx); err != nil {
		return err
	}
	addTimes(c.right, c.left, c.r1, third*g1)
	addTimes(c.right, c.inner, c.r1, 2*third)
	addSquare(c.right, c.phi1, c.r1, -third)
	addTimes(c.right, c.phi1, c.r2, second*g1)
	addMultiple(c.right, c.inner, second*g2)
	addTimes(c.right, c.phi1, c.r1, -second*g2)
	addMultiple(c.right, c.phi1, first*g4)
	addTimes(c.right, c.psi, c.r4, first)
	return nil
}

func clearVector(v vector) {
	clear(v.Re)
	clear(v.Im)
}
