package session

import "hilltop/bosehubbard/report"

// Parts of a report under the names that a view uses, which reaches the library
// through this package alone.
type (
	Report    = report.Report
	Criterion = report.Criterion
	Bound     = report.Bound
)
