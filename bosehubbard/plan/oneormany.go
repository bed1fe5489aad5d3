package plan

import (
	"encoding/json"
	"fmt"
)

// OneOrMany is a value that the document gives as one number for all axes or as
// a list with one number per axis.
type OneOrMany struct {
	Values []float64
	Single bool // written as one number; Values then has length 1
}

// At returns the number of axis i. A missing entry is 0.
func (v OneOrMany) At(i int) float64 {
	if v.Single {
		i = 0
	}
	if i < 0 || i >= len(v.Values) {
		return 0
	}
	return v.Values[i]
}

// Expanded returns n numbers, one per axis.
func (v OneOrMany) Expanded(n int) []float64 {
	out := make([]float64, n)
	for i := range out {
		out[i] = v.At(i)
	}
	return out
}

// MarshalJSON writes the number or the list.
func (v OneOrMany) MarshalJSON() ([]byte, error) {
	if v.Single && len(v.Values) == 1 {
		return json.Marshal(v.Values[0])
	}
	return json.Marshal(v.Values)
}

// UnmarshalJSON reads a number or a list of numbers.
//
// It returns an error if the text is neither.
func (v *OneOrMany) UnmarshalJSON(text []byte) error {
	var one float64
	if json.Unmarshal(text, &one) == nil && string(text) != "null" {
		*v = OneOrMany{Values: []float64{one}, Single: true}
		return nil
	}
	var many []float64
	if err := json.Unmarshal(text, &many); err != nil {
		return fmt.Errorf("plan: %.40s, want a number or a list of numbers: %w", text, err)
	}
	*v = OneOrMany{Values: many}
	return nil
}
