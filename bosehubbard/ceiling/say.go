package ceiling

import (
	"fmt"

	"hilltop/bosehubbard/num/digits"
)

// plus is a number whose sign is shown.
type plus float64

// say is Sprintf with numbers as people read them, to four digits.
func say(format string, args ...any) string {
	for i, arg := range args {
		switch v := arg.(type) {
		case float64:
			args[i] = digits.Format(v, 4)
		case plus:
			args[i] = digits.Signed(float64(v), 4)
		}
	}
	return fmt.Sprintf(format, args...)
}
