package report

import (
	"math"
	"strconv"
	"strings"
)

// unknown stands on the screen for a number that there is not.
const unknown = "-"

// quantityNoise is the relative size of what adding up floating-point volumes leaves behind; rounding up disregards it, so that a sum
// of 10 m3 is not shown as 10.01.
const quantityNoise = 1e-12

// FactorText returns a factor of safety rounded down to three decimals, and "-" if it is not known. It works on the shortest decimals
// that stand for the number: 1.001 stays 1.001 though its binary value lies just below.
func FactorText(fs Number) string {
	if !fs.Known() {
		return unknown
	}
	return floorText(float64(fs), 3)
}

// RequiredText returns a required factor of safety rounded up to three decimals, and "-" if it is not known.
func RequiredText(fs Number) string {
	if !fs.Known() {
		return unknown
	}
	return ceilText(float64(fs), 3)
}

// QuantityText returns a quantity rounded up to two decimals.
func QuantityText(q float64) string {
	if !Number(q).Known() {
		return unknown
	}
	return ceilText(q-quantityNoise*math.Abs(q), 2)
}

// TotalText returns the quantity of the whole works rounded up to a whole number, with thousands set apart.
func TotalText(q float64) string {
	if !Number(q).Known() {
		return unknown
	}
	s := ceilText(q-quantityNoise*math.Abs(q), 0)
	for i := len(s) - 3; i > 0 && s[i-1] != '-'; i -= 3 {
		s = s[:i] + "," + s[i:]
	}
	return s
}

// SizeText returns a dimension with the decimals it was set out with, three at most; one that these would show as nothing, such as a
// permeability, as a power of ten.
func SizeText(v float64) string {
	const decimals = 1e3
	if v != 0 && math.Abs(v) < 0.5/decimals {
		return strings.Replace(strconv.FormatFloat(v, 'g', 3, 64), "e-0", "e-", 1)
	}
	return strconv.FormatFloat(math.Round(v*decimals)/decimals, 'f', -1, 64)
}

// floorText rounds towards minus infinity on the decimal digits of v.
func floorText(v float64, decimals int) string {
	kept, rest := split(v, decimals)
	if rest && strings.HasPrefix(kept, "-") {
		kept = away(kept)
	}
	return kept
}

// ceilText rounds towards plus infinity on the decimal digits of v.
func ceilText(v float64, decimals int) string {
	kept, rest := split(v, decimals)
	if rest && !strings.HasPrefix(kept, "-") {
		kept = away(kept)
	}
	return kept
}

// split returns the digits of v cut off behind that many decimals, and whether anything but zeros was cut off.
func split(v float64, decimals int) (kept string, rest bool) {
	whole, frac, _ := strings.Cut(strconv.FormatFloat(v, 'f', -1, 64), ".")
	frac += strings.Repeat("0", decimals)
	rest = strings.Trim(frac[decimals:], "0") != ""
	if decimals == 0 {
		return whole, rest
	}
	return whole + "." + frac[:decimals], rest
}

// away adds one to the last digit, away from zero.
func away(s string) string {
	b := []byte(s)
	for i := len(b) - 1; i >= 0; i-- {
		switch {
		case b[i] == '.':
		case b[i] == '-':
			return "-1" + string(b[1:])
		case b[i] < '9':
			b[i]++
			return string(b)
		default:
			b[i] = '0'
		}
	}
	return "1" + string(b)
}
