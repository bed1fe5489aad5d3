package gutzwiller

import "fmt"

// Report tells how a run went.
type Report struct {
	Steps, Rejected int
	LargestError    float64 // estimate of the error of a site in one step, amplitude

	// NormDrift and NumberDrift add up what the method let slip in all steps before
	// it was set right: the largest |norm - 1| of a site, and |change of the number
	// of atoms| / number. NumberDefect is what is left of the latter at the end.
	NormDrift, NumberDrift, NumberDefect float64

	TopWeight float64 // largest probability of a site in its last level, over the run
	TopSite   int
}

// Add appends the report of the next run.
func (r *Report) Add(next Report) {
	r.Steps += next.Steps
	r.Rejected += next.Rejected
	r.LargestError = max(r.LargestError, next.LargestError)
	r.NormDrift += next.NormDrift
	r.NumberDrift += next.NumberDrift
	r.NumberDefect += next.NumberDefect
	if next.TopWeight > r.TopWeight {
		r.TopWeight, r.TopSite = next.TopWeight, next.TopSite
	}
}

// CutoffError says that too much of a site sits in its last level.
type CutoffError struct {
	Seconds       float64
	Site, Levels  int
	Weight, Limit float64
}

func (e *CutoffError) Error() string {
	return fmt.Sprintf("gutzwiller: site %d has probability %.3g of %d atoms at %g s, limit %.3g: %d levels are too few",
		e.Site, e.Weight, e.Levels-1, e.Seconds, e.Limit, e.Levels)
}

// StepError says that the step became too small to go on.
type StepError struct{ Seconds, Step, Estimate, Tolerance float64 }

func (e *StepError) Error() string {
	return fmt.Sprintf("gutzwiller: step of %g s at %g s leaves an error of %.3g, want %.3g; does the drive jump inside the run?",
		e.Step, e.Seconds, e.Estimate, e.Tolerance)
}
