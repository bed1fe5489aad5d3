package main

import (
	"context"
	"errors"
	"fmt"
	"io"
	"math"
	"strings"
	"text/tabwriter"
	"time"

	"hilltop/bosehubbard/passage"
	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/report"
	"hilltop/bosehubbard/thermo"
)

// simulateAnswer holds the keys of the verb simulate.
type simulateAnswer struct {
	Title     string           `json:"title,omitempty"`
	Dimension int              `json:"dimension"`
	Trace     trace            `json:"trace"`
	Stages    []stageEnd       `json:"stages"`
	Final     final            `json:"final"`
	Seconds   simulateSeconds  `json:"seconds"`
	Cautions  []report.Caution `json:"cautions"`
}

// trace is the passage in columns of one length; energies count for all terms of
// the Hamiltonian, without a shift.
type trace struct {
	TimeMS      []float64 `json:"time_ms"`
	Stage       []string  `json:"stage"`
	Tunnelling  []float64 `json:"tunnelling_hz"` // of the axis where it is largest
	U           []float64 `json:"interaction_hz"`
	Energy      []float64 `json:"energy_hz_per_atom"`
	Kinetic     []float64 `json:"kinetic_hz_per_atom"`
	Interaction []float64 `json:"interaction_hz_per_atom"`
	Potential   []float64 `json:"potential_hz_per_atom"`
	Pairs       []float64 `json:"pairs_per_atom"`
	NormDefect  []float64 `json:"norm_defect"`
}

type stageEnd struct {
	Name           string   `json:"name"`
	TimeMS         float64  `json:"time_ms"`
	CornerFraction float64  `json:"corner_fraction"`
	Overlap        *float64 `json:"overlap,omitempty"`
}

type final struct {
	Energy            float64   `json:"energy_hz_per_atom"`
	Kinetic           float64   `json:"kinetic_hz_per_atom"`
	Interaction       float64   `json:"interaction_hz_per_atom"`
	Potential         float64   `json:"potential_hz_per_atom"`
	Pairs             float64   `json:"pairs_per_atom"`
	Temperature       any       `json:"temperature_per_tunnelling,omitempty"` // null at beta = 0
	Entropy           *float64  `json:"entropy_per_atom_kb,omitempty"`
	CornerFraction    float64   `json:"corner_fraction"`
	NormDefect        float64   `json:"norm_defect"`
	OrderingError     float64   `json:"ordering_error"`
	KrylovError       float64   `json:"krylov_error"`
	LimitsError       float64   `json:"limits_error"`
	Occupation        []float64 `json:"occupation"`
	SquaredOccupation []float64 `json:"squared_occupation"`
}

type simulateSeconds struct {
	seconds
	Temperature float64 `json:"temperature,omitempty"`
}

// passageAnswer fills in what the simulation itself gives.
func passageAnswer(p *plan.Plan, s *passage.Sequence, r *passage.Result) *simulateAnswer {
	a := &simulateAnswer{
		Title: p.Title, Dimension: r.Dimension, Trace: traceOf(s, r.Trace), Stages: []stageEnd{},
		Seconds: simulateSeconds{seconds: seconds{r.BuildSeconds, r.SolveSeconds}},
	}
	for _, e := range r.Ends {
		end := stageEnd{Name: e.Name, TimeMS: e.Time * 1e3, CornerFraction: e.CornerFraction}
		if e.Overlap != nil {
			end.Overlap = &e.Overlap.Weight
		}
		a.Stages = append(a.Stages, end)
	}
	last := r.Trace[len(r.Trace)-1]
	a.Final = final{
		Energy: last.Energy, Kinetic: last.Kinetic, Interaction: last.Interaction, Potential: last.Potential,
		Pairs: last.Pairs, CornerFraction: r.Final.CornerFraction, NormDefect: last.NormDefect,
		OrderingError: r.Errors.Ordering, KrylovError: r.Errors.Krylov, LimitsError: r.Errors.Limits,
		Occupation: last.Occupation, SquaredOccupation: last.SquaredOccupation,
	}
	a.caution("closed", "The system is closed and has one band: loss, heating and higher bands are not in it.")
	return a
}

// traceOf turns points into columns.
func traceOf(s *passage.Sequence, points []passage.Point) (t trace) {
	for _, point := range points {
		name := ""
		if len(s.Stages) > 0 {
			name = s.Stages[point.Stage].Name
		}
		t.Stage = append(t.Stage, name)
		largest := 0.0
		for _, axis := range point.Model.Axes {
			if math.Abs(axis.Tunnelling) > math.Abs(largest) {
				largest = axis.Tunnelling
			}
		}
		t.Tunnelling = append(t.Tunnelling, largest)
		t.TimeMS = append(t.TimeMS, point.Time*1e3)
		t.U = append(t.U, point.Model.Interaction)
		t.Energy = append(t.Energy, point.Energy)
		t.Kinetic = append(t.Kinetic, point.Kinetic)
		t.Interaction = append(t.Interaction, point.Interaction)
		t.Potential = append(t.Potential, point.Potential)
		t.Pairs = append(t.Pairs, point.Pairs)
		t.NormDefect = append(t.NormDefect, point.NormDefect)
	}
	return t
}

func (a *simulateAnswer) caution(code, text string) {
	a.Cautions = append(a.Cautions, report.Caution{Code: code, Text: text})
}

// match adds temperature and entropy.
func (a *simulateAnswer) match(ctx context.Context, s *passage.Sequence, r *passage.Result, progress func(done, total int)) error {
	begin := time.Now()
	last := r.Trace[len(r.Trace)-1]
	t, err := passage.Match(ctx, s.Lattice, last.Model, s.Atoms, last.Energy, thermo.CanonicalOptions{Progress: progress})
	a.Seconds.Temperature = time.Since(begin).Seconds()
	switch {
	case errors.Is(err, passage.ErrAtEnd):
		a.caution("at_end", "The energy is at an end of the spectrum: the temperature is too near 0 to be told from it.")
		return nil
	case err != nil:
		return err
	}
	a.Final.Entropy = &t.EntropyPerAtom
	switch {
	case math.IsInf(t.PerTunnelling, 0):
		a.Final.Temperature = nullNumber{}
	case !math.IsNaN(t.PerTunnelling):
		a.Final.Temperature = t.PerTunnelling
	default:
		a.caution("no_tunnelling", "Without tunnelling at the end there is no temperature in its units.")
	}
	return nil
}

// nullNumber is written as null, where an absent key would mean not computed.
type nullNumber struct{}

func (nullNumber) MarshalJSON() ([]byte, error) { return []byte("null"), nil }

// write prints the answer for people.
func (a *simulateAnswer) write(w io.Writer) error {
	var text strings.Builder
	if a.Title != "" {
		fmt.Fprintf(&text, "%s\n", a.Title)
	}
	fmt.Fprintf(&text, "%d states\n\nEnergies in Hz per atom\n", a.Dimension)
	table := tabwriter.NewWriter(&text, 0, 0, 2, ' ', 0)
	fmt.Fprintln(table, "time/ms\tstage\tJ\tU\tenergy\tkinetic\tinteraction\ttrap\tpairs")
	t := &a.Trace
	for i := range t.TimeMS {
		fmt.Fprintf(table, "%s\t%s\t%s\t%s\t%s\t%s\t%s\t%s\t%s\n", figure(t.TimeMS[i]), t.Stage[i], figure(t.Tunnelling[i]), figure(t.U[i]),
			figure(t.Energy[i]), figure(t.Kinetic[i]), figure(t.Interaction[i]), figure(t.Potential[i]), figure(t.Pairs[i]))
	}
	table.Flush()
	fmt.Fprintf(&text, "\nAt the end\n")
	a.writeFinal(table)
	table.Flush()
	fmt.Fprintf(&text, "\nCautions\n")
	for _, c := range a.Cautions {
		fmt.Fprintf(&text, "- %s\n", c.Text)
	}
	_, err := io.WriteString(w, text.String())
	return err
}

// writeFinal prints the end.
func (a *simulateAnswer) writeFinal(w io.Writer) {
	f := &a.Final
	fmt.Fprintf(w, "energy\t%.8g Hz per atom\n", f.Energy)
	if t, ok := f.Temperature.(float64); ok {
		fmt.Fprintf(w, "temperature\t%s J/kB\n", figure(t))
	}
	if f.Entropy != nil {
		fmt.Fprintf(w, "entropy\t%s kB per atom\n", figure(*f.Entropy))
	}
	fmt.Fprintf(w, "at the zone corner\t%s %% of the atoms\n", figure(100*f.CornerFraction))
	for _, s := range a.Stages {
		if s.Overlap != nil {
			fmt.Fprintf(w, "weight of the wanted end after %s\t%s\n", s.Name, figure(*s.Overlap))
		}
	}
	fmt.Fprintf(w, "error of the state\t%.1e, estimated\n", f.OrderingError+f.KrylovError+f.LimitsError)
}
