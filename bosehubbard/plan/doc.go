// Package plan reads, checks, edits and saves the plan document: the file in
// which a user states an apparatus, a cloud of atoms and a sequence of stages,
// or a lattice model, or a set of levels. It judges nothing.
//
// A plan is JSON in UTF-8. Every key carries its unit: depth_er in recoil
// energies h^2/(8 m d^2), power_w in watts of one incoming pass, field_g in
// gauss, duration_ms, waist_um (1/e^2 intensity radius), wavelength_nm in
// vacuum. The Go types mirror the document and keep these scaled units;
// [Plan.Apparatus] and [Plan.Sequence] are the one place where they become SI.
//
// [Parse] collects all mistakes of a document at once as [Errors]. Unknown keys
// are mistakes; keys that start with x_ are the user's own, kept and ignored.
//
// A knob is a quantity that a stage can set. Its name is the key below a stage:
// "depth_er/0" (an index into lattice.axes), "power_w/NAME" (the bare name of
// the beam), "field_g", and for a model plan "tunnelling_hz/0",
// "interaction_hz", "curvature_hz/0". A path is an RFC 6901 pointer into the
// document, in which "~" and "/" of a name are written "~0" and "~1".
//
// [Document] is the text of a plan that can be edited value by value while all
// other bytes stay as the user wrote them.
//
// References: RFC 8259 (JSON), RFC 6901 (JSON Pointer); the JSON Schema of the
// document, draft 2020-12, is [hilltop/assets.PlanSchema].
package plan
