package fock

import (
	"bufio"
	"fmt"
	"io"
	"math"
	"os"
	"strconv"
	"strings"
)

// DefaultMemory is what AvailableMemory assumes where the machine does not say.
const DefaultMemory = 4 << 30 // bytes

// maxBytes stands for every larger need, so that figures stay finite.
const maxBytes = 1e300

// Options of an operator. The zero value works.
type Options struct {
	MemoryBytes   uint64 // memory that may be used; 0: AvailableMemory
	Vectors       int    // vectors that will stand beside the operator; 0: two, x and y
	MaxOccupation int    // most atoms on one site; 0: no limit
	Parity        int    // +1 or -1: only the states of that parity of Terms.Mirror; 0: all
}

// checked fills in the defaults and refuses options that make no sense.
func (o Options) checked(sites, atoms int) (Options, error) {
	if o.Vectors < 0 {
		return o, fmt.Errorf("fock: %d vectors, want at least 0", o.Vectors)
	}
	if o.Parity < -1 || o.Parity > 1 {
		return o, fmt.Errorf("fock: parity %d, want +1, -1 or 0", o.Parity)
	}
	if o.MaxOccupation < 0 {
		return o, fmt.Errorf("fock: at most %d atoms on a site, want at least 1, or 0 for no limit", o.MaxOccupation)
	}
	if o.MaxOccupation > 0 && o.MaxOccupation < (atoms+sites-1)/sites {
		return o, fmt.Errorf("fock: at most %d atoms on each of %d sites leave no room for %d", o.MaxOccupation, sites, atoms)
	}
	if o.Vectors == 0 {
		o.Vectors = 2
	}
	if o.MemoryBytes == 0 {
		o.MemoryBytes = AvailableMemory()
	}
	return o, nil
}

// TooLargeError says that a system does not fit the memory.
type TooLargeError struct {
	Sites, Atoms   int
	Dimension      string  // decimal; rounded, as 1.353e+40, beyond 30 digits
	BytesWanted    float64 // capped at 1e300
	BytesAvailable uint64
	LargestSites   int // most sites that fit with the atoms in proportion, rounded up; 0 if none
}

func (e *TooLargeError) Error() string {
	advice := "not even one site at this filling would fit"
	if e.LargestSites > 0 {
		advice = fmt.Sprintf("the largest size at this filling is %d sites", e.LargestSites)
	}
	return fmt.Sprintf("fock: %d atoms on %d sites make %s states, which need %s of memory; %s are available; %s",
		e.Atoms, e.Sites, e.Dimension, bytesText(e.BytesWanted), bytesText(float64(e.BytesAvailable)), advice)
}

// Fit returns the dimension of a chain if its operator and opt.Vectors vectors fit
// the memory; other graphs need much the same. It allocates nothing and takes
// microseconds for any arguments. It knows no limit of the occupation.
//
// It returns a *TooLargeError if they do not fit, and a plain error if
// sites < 1, atoms < 0 or an option makes no sense.
func Fit(sites, atoms int, opt Options) (int, error) {
	if err := check(sites, atoms); err != nil {
		return 0, err
	}
	opt, err := opt.checked(sites, atoms)
	if err != nil {
		return 0, err
	}
	wanted := bytesWanted(sites, atoms, opt)
	if wanted <= float64(opt.MemoryBytes) && LogDimension(sites, atoms) < 43 { // e^43 < 2^63
		return int(binomial(sites, atoms).Int64()), nil
	}
	return 0, tooLarge(sites, atoms, wanted, opt)
}

func tooLarge(sites, atoms int, wanted float64, opt Options) *TooLargeError {
	return &TooLargeError{
		Sites: sites, Atoms: atoms, Dimension: dimensionText(sites, atoms),
		BytesWanted: wanted, BytesAvailable: opt.MemoryBytes,
		LargestSites: largestSites(sites, atoms, opt),
	}
}

// bytesWanted counts the vectors, the lists of a chain cut in the middle, and the
// tables. All states of up to N atoms on m sites are as many as those of N on m+1;
// each has some numbers of its own, and two entries for every hop that it allows.
func bytesWanted(sites, atoms int, opt Options) float64 {
	states := math.Exp(LogDimension(sites, atoms))
	bytes := tableBytes(sites, atoms)
	list := func(m, space int) { // m sites, as many states as all atoms have on space sites
		bytes += stateBytes*math.Exp(LogDimension(space, atoms)) +
			hopBytes*2*float64(m-1)*math.Exp(LogDimension(space, max(atoms-1, 0)))
	}
	switch {
	case opt.Parity != 0 && sites > 1:
		states /= 2
		list(sites/2, sites/2+1)
	case sites > 2:
		list(sites/2, sites/2+1)
		list(sites-sites/2, sites-sites/2+1)
	case sites == 2: // not cut
		list(2, 2)
	}
	return min(bytes+8*states*float64(opt.Vectors), maxBytes)
}

// Bytes of a state of one half, with its place in two ladders and half an empty
// place in a pair of hops, and of a hop.
const (
	stateBytes = 8 + 8 + 4 + 2*12 + 6
	hopBytes   = 12
)

// tableBytes is the size of the tables of both halves.
func tableBytes(sites, atoms int) float64 {
	if sites == 1 {
		return 0
	}
	return 8 * (float64(sites) + 2) * (float64(atoms) + 1)
}

// fitTables refuses, before anything is allocated, what is too large without any
// doubt: tables that do not fit, and where the occupation is not limited, vectors.
func (o Options) fitTables(sites, atoms int) error {
	wanted := tableBytes(sites, atoms)
	if o.MaxOccupation == 0 || o.MaxOccupation >= atoms {
		wanted = bytesWanted(sites, atoms, o)
		wanted -= wanted / 20 // the lists are only estimated: leave it to fit
	}
	if wanted > float64(o.MemoryBytes) {
		return tooLarge(sites, atoms, wanted/0.95, o)
	}
	return nil
}

// fit refuses an operator whose vectors and lists, counted before they are built,
// do not fit the memory.
func (h *Operator) fit(opt Options) error {
	bytes := 8*float64(h.length)*float64(opt.Vectors) + h.listBytes() + tableBytes(h.terms.Sites, h.atoms)
	if bytes > float64(opt.MemoryBytes) || h.length > math.MaxInt/16 || h.listTooLong() {
		e := tooLarge(h.terms.Sites, h.atoms, bytes, opt)
		if h.most < h.atoms {
			e.Dimension = strconv.Itoa(h.dimension)
		}
		return e
	}
	return nil
}

// listTooLong says whether a list of one half is longer than its numbers of 32 bits.
func (h *Operator) listTooLong() bool {
	for i := range h.blocks {
		b := &h.blocks[i]
		if max(b.rows+h.left.numberOfHops(b.left), b.cols+h.right.numberOfHops(b.right)) > math.MaxInt32 {
			return true
		}
	}
	return false
}

// listBytes counts what the operator will hold of the halves.
func (h *Operator) listBytes() float64 {
	bytes := 0.0
	rows, cols := map[int]bool{}, map[int]bool{}
	if h.parity != 0 {
		rows = cols
	}
	count := func(p *part, seen map[int]bool, t int) {
		if !seen[t] {
			seen[t] = true
			bytes += stateBytes*float64(p.count(t)) + hopBytes*float64(p.numberOfHops(t))
		}
	}
	for i := range h.blocks {
		count(h.left, rows, h.blocks[i].left)
		count(h.right, cols, h.blocks[i].right)
	}
	return bytes + 200*float64(len(h.blocks))
}

// largestSites bisects for the largest L' < sites whose ceil(N L'/sites) atoms fit.
// The need never falls when L' grows.
func largestSites(sites, atoms int, opt Options) int {
	fits := func(l int) bool {
		n := math.Ceil(float64(atoms) * (float64(l) / float64(sites)))
		return bytesWanted(l, int(min(n, float64(atoms))), opt) <= float64(opt.MemoryBytes)
	}
	low, high := 0, sites // low fits, high does not
	for high-low > 1 {
		if middle := low + (high-low)/2; fits(middle) {
			low = middle
		} else {
			high = middle
		}
	}
	return low
}

// AvailableMemory returns the bytes that the machine can give without swapping:
// MemAvailable of /proc/meminfo on Linux, DefaultMemory where there is no such file.
func AvailableMemory() uint64 {
	file, err := os.Open("/proc/meminfo")
	if err != nil {
		return DefaultMemory
	}
	defer file.Close()
	return memAvailable(file)
}

// memAvailable reads the line "MemAvailable:   23769000 kB".
func memAvailable(r io.Reader) uint64 {
	lines := bufio.NewScanner(r)
	for lines.Scan() {
		cells := strings.Fields(lines.Text())
		if len(cells) == 3 && cells[0] == "MemAvailable:" && cells[2] == "kB" {
			if kilobytes, err := strconv.ParseUint(cells[1], 10, 53); err == nil {
				return kilobytes << 10
			}
		}
	}
	return DefaultMemory
}

// bytesText writes a number of bytes for a person.
func bytesText(bytes float64) string {
	if bytes >= maxBytes {
		return fmt.Sprintf("over %.3g bytes", maxBytes)
	}
	if bytes >= 1e21 {
		return fmt.Sprintf("%.3g bytes", bytes)
	}
	units := []string{"B", "kB", "MB", "GB", "TB", "PB", "EB"}
	i := 0
	for bytes >= 999.5 && i < len(units)-1 {
		bytes /= 1000
		i++
	}
	return fmt.Sprintf("%.3g %s", bytes, units[i])
}
