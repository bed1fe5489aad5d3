package digits

import "testing"

func TestFormat(t *testing.T) {
	for _, tc := range []struct {
		v    float64
		n    int
		want string
	}{
		{0, 3, "0"}, {1234.56, 3, "1230"}, {27110, 4, "27110"}, {-983.74, 3, "−984"}, {0.0871, 2, "0.087"}, {1e-5, 3, "0.00001"},
		{1.23e-7, 2, "1.2e−7"}, {1e12, 3, "1e12"}, {-2.5e13, 3, "−2.5e13"}, {99.96, 3, "100"}, {1.50, 3, "1.5"}, {999999999, 9, "999999999"},
	} {
		if got := Format(tc.v, tc.n); got != tc.want {
			t.Errorf("Format(%g, %d) = %q, want %q", tc.v, tc.n, got, tc.want)
		}
	}
	if got := Signed(12.44, 3) + Signed(-1, 1) + Signed(0, 2) + Size(-2.5, 2); got != "+12.4−102.5" {
		t.Errorf("signed numbers: %q", got)
	}
}
