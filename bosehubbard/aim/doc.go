// Package aim answers the inverse question: which value of a knob mends a broken
// criterion.
//
// It speaks knob names and works in the units in which the knobs are given; what
// the knobs do to the energy it learns only through the function it is handed.
// The turn of a knob is followed from its present value towards an end of its
// range; the advice is the smallest turn that mends the criterion and, if one
// can be had, seals the plan. Values are rounded onwards to two digits, so that
// the criterion keeps some room.
package aim
