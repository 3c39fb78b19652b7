package remedies

import (
	"math"
	"strconv"
	"strings"
)

// floorFS prints a factor of safety to three decimals, never rounded up: what follows the third decimal is dropped.
func floorFS(f float64) string {
	if math.IsNaN(f) {
		return "not found"
	}
	s := strconv.FormatFloat(f, 'f', -1, 64)
	whole, fraction, _ := strings.Cut(s, ".")
	return whole + "." + (fraction + "000")[:3]
}

// fsText prints a required factor of safety as short as it is.
func fsText(f float64) string {
	if s := strconv.FormatFloat(f, 'f', 2, 64); math.Abs(f-math.Round(f*100)/100) < 1e-12 {
		return s
	}
	return strconv.FormatFloat(math.Ceil(f*1000)/1000, 'f', 3, 64)
}
