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

// Options limits the memory of a basis or an operator. The zero value works.
type Options struct {
	MemoryBytes uint64 // memory that may be used; 0: AvailableMemory
	Vectors     int    // vectors as long as the basis that will stand beside it; 0: two, x and y
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

// Fit returns the dimension of a system if its operator and opt.Vectors vectors
// fit the memory. It allocates nothing and takes microseconds for any arguments.
//
// It returns a *TooLargeError if they do not fit, and a plain error if
// sites < 1, atoms < 0 or opt.Vectors < 0.
func Fit(sites, atoms int, opt Options) (int, error) {
	if err := check(sites, atoms); err != nil {
		return 0, err
	}
	if opt.Vectors < 0 {
		return 0, fmt.Errorf("fock: %d vectors, want at least 0", opt.Vectors)
	}
	if opt.Vectors == 0 {
		opt.Vectors = 2
	}
	if opt.MemoryBytes == 0 {
		opt.MemoryBytes = AvailableMemory()
	}
	wanted := bytesWanted(sites, atoms, opt.Vectors)
	if wanted <= float64(opt.MemoryBytes) && LogDimension(sites, atoms) < 43 { // e^43 < 2^63
		return int(binomial(sites, atoms).Int64()), nil
	}
	return 0, &TooLargeError{
		Sites: sites, Atoms: atoms, Dimension: dimensionText(sites, atoms),
		BytesWanted: wanted, BytesAvailable: opt.MemoryBytes,
		LargestSites: largestSites(sites, atoms, opt),
	}
}

// bytesWanted counts the diagonal, the vectors and the table of binomials.
func bytesWanted(sites, atoms, vectors int) float64 {
	table := 0.0
	if sites > 1 {
		table = 8 * float64(sites) * (float64(atoms) + 2)
	}
	return min(8*math.Exp(LogDimension(sites, atoms))*(1+float64(vectors))+table, maxBytes)
}

// largestSites bisects for the largest L' < sites whose ceil(N L'/sites) atoms fit.
// The need never falls when L' grows.
func largestSites(sites, atoms int, opt Options) int {
	fits := func(l int) bool {
		n := math.Ceil(float64(atoms) * (float64(l) / float64(sites)))
		return bytesWanted(l, int(min(n, float64(atoms))), opt.Vectors) <= float64(opt.MemoryBytes)
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
