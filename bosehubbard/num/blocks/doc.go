// Package blocks shares a loop over fixed blocks between goroutines.
//
// The blocks do not depend on the number of goroutines, and what a block computes
// goes to a place of its own. So a sum that is reduced in the order of the blocks
// has the same bits for any number of workers.
package blocks
