package gutzwiller

import "math"

// stage holds the terms at one stage of a step.
type stage struct {
	tunnelling [3]float64 // rad/s
	factors    []factor
	left       []float64 // energy of each level that does not turn with the frame, rad/s
	angles     []float64 // integral of each weight since the start of the step, rad
	weights    []float64 // rad/s; the plain method only
}

// setStages turns what the sampler read into the terms of the stages. The last
// entry stands for the end of the step.
func (e *Engine) setStages(step float64) {
	const turns = 2 * math.Pi
	s := e.sampler
	if !e.known { // or the rate that is left would be of another frame
		e.turned = e.share()
	}
	for i := range e.stages {
		st := &e.stages[i]
		theta := e.turned * turns * step * s.interaction(&s.integral[i])
		for k := range st.angles {
			st.angles[k] = turns * step * s.weight(&s.integral[i], k)
		}
		for n := range st.factors {
			sin, cos := math.Sincos(theta * float64(n))
			root := math.Sqrt(float64(n + 1))
			st.factors[n] = factor{root * cos, -root * sin}
		}
		if i == len(e.stages)-1 {
			e.setFinal(theta)
			break
		}
		for axis := range st.tunnelling {
			st.tunnelling[axis] = turns * s.tunnelling(&s.values[i], axis)
		}
		left := (1 - e.turned) * turns * s.interaction(&s.values[i])
		for n := range st.left {
			st.left[n] = left * float64(n*(n-1)/2)
		}
		for k := range st.weights {
			st.weights[k] = turns * s.weight(&s.values[i], k)
		}
	}
}

// share is the share of the interaction that the frame turns with: all of it without
// tunnelling, so that nothing is left to follow; half where sites are coherent and
// their levels turn together, which makes steps up to a quarter longer for the same
// error. What is left must not limit the step by the top level alone.
func (e *Engine) share() float64 {
	if e.options.PlainStep > 0 {
		return 0
	}
	var tunnelling, interaction float64
	for i := range e.sampler.terms {
		t := &e.sampler.terms[i]
		sum := 0.0
		for _, j := range t.Tunnelling[:e.system.Grid.Axes] {
			sum += 2 * math.Abs(j)
		}
		tunnelling, interaction = max(tunnelling, sum), max(interaction, math.Abs(t.Interaction))
	}
	top := float64((e.system.Levels - 1) * (e.system.Levels - 2) / 2)
	if reach := 5 * tunnelling; reach < 0.5*interaction*top {
		return 1 - reach/(interaction*top)
	}
	return 0.5
}

func (e *Engine) setFinal(theta float64) {
	for n := range e.final {
		sin, cos := math.Sincos(theta * float64(n*(n-1)/2))
		e.final[n] = factor{cos, -sin}
	}
}
