// Package sequence says what the knobs are doing at any time: ramps between the
// ends of stages, the hold at the end, and the poles and zeros of the scattering
// length that the field crosses on the way.
//
// Times are in seconds from the start of the first stage; settings are those of
// package apparatus.
package sequence
