package main

import (
	"context"
	"errors"
	"slices"
	"strings"

	"hilltop/bosehubbard/fock"
	"hilltop/bosehubbard/plan"
)

// The kinds of failure in the "error" object.
const (
	usage       = "usage"       // the command line
	document    = "document"    // the plan
	file        = "file"        // reading or writing
	tooLarge    = "too_large"   // does not fit into memory
	stopped     = "stopped"     // by a signal
	computation = "computation" // everything else
)

// failure is the "error" object of --json.
type failure struct {
	Kind    string             `json:"kind"`
	Message string             `json:"message"`
	Fields  []*plan.FieldError `json:"fields,omitempty"`
	*size
}

// size is added where a system is too large.
type size struct {
	Dimension      string `json:"dimension"`
	BytesWanted    any    `json:"bytes_wanted"`
	BytesAvailable any    `json:"bytes_available"`
	LargestSites   int    `json:"largest_sites"`
}

// code is the exit code of a failure.
func (f failure) code() int {
	switch f.Kind {
	case usage, document, tooLarge:
		return 2
	}
	return 1
}

// usageError marks a mistake on the command line.
type usageError struct{ error }

func (e usageError) Unwrap() error { return e.error }

// fileError marks what reading or writing a file failed with; a document that was
// read and refused keeps its own type inside.
type fileError struct{ error }

func (e fileError) Unwrap() error { return e.error }

func failureOf(err error) failure {
	f := failure{Kind: computation, Message: err.Error()}
	var mistakes plan.Errors
	var syntax *plan.SyntaxError
	var bulk *plan.SizeError
	var large *fock.TooLargeError
	switch {
	case errors.As(err, &mistakes):
		f.Kind, f.Fields = document, mistakes
	case errors.As(err, &syntax), errors.As(err, &bulk):
		f.Kind = document
	case errors.As(err, &large):
		f.Kind = tooLarge
		f.size = &size{large.Dimension, large.BytesWanted, large.BytesAvailable, large.LargestSites}
	case errors.As(err, new(usageError)), isCobraUsage(err):
		f.Kind = usage
	case errors.As(err, new(fileError)):
		f.Kind = file
	case errors.Is(err, context.Canceled):
		f.Kind, f.Message = stopped, "stopped before it was done"
	}
	return f
}

// isCobraUsage recognises the errors for which the command-line library has no
// type: an unknown verb, a missing required flag, flags that exclude each other.
func isCobraUsage(err error) bool {
	starts := []string{"unknown command", "required flag", "if any flags in the group", "at least one of the flags in the group"}
	return slices.ContainsFunc(starts, func(start string) bool { return strings.HasPrefix(err.Error(), start) })
}
