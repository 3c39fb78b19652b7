package drawing

import (
	"math"
	"strconv"
	"strings"
	"unicode"
	"unicode/utf8"

	"standfast/lem"
	"standfast/remedies"
)

// sumNoise is what the sum of areas of a section can be off by rounding alone, m3/m; a quantity is not rounded up for it.
const sumNoise = 1e-9

// fsDown writes a factor of safety with three decimals, never higher than it is.
func fsDown(v float64) string { return cutShort(v, 3) }

// cutShort writes a positive number with so many decimals, never higher than it is: the shortest decimal that reads back as v is cut.
func cutShort(v float64, decimals int) string {
	whole, rest, _ := strings.Cut(strconv.FormatFloat(v, 'f', -1, 64), ".")
	return whole + "." + (rest + strings.Repeat("0", decimals))[:decimals]
}

// quantityUp writes a quantity with two decimals, rounded up.
func quantityUp(v float64) string {
	return strconv.FormatFloat(math.Ceil((v-sumNoise)*100)/100+0, 'f', 2, 64)
}

// upTo writes a positive number rounded up to so many decimals.
func upTo(v float64, decimals int) string {
	unit := math.Pow10(decimals)
	return strconv.FormatFloat(math.Ceil(v*unit-sumNoise)/unit, 'f', decimals, 64)
}

// requiredUp writes a required factor of safety, rounded up, with two decimals where they are enough and three else.
func requiredUp(v float64) string { return strings.TrimSuffix(upTo(v, 3), "0") }

// number writes v with at least the given decimals and at most four.
func number(v float64, decimals int) string {
	s := strconv.FormatFloat(v, 'f', 4, 64)
	for n := 4; n > decimals && s[len(s)-1] == '0'; n-- {
		s = s[:len(s)-1]
	}
	return strings.TrimSuffix(s, ".")
}

// rounded writes a coordinate with two decimals, to the nearest.
func rounded(v float64) string { return strconv.FormatFloat(v, 'f', 2, 64) }

// metres writes a length or coordinate with its unit.
func metres(v float64) string { return number(v, 2) + " m" }

// value writes a parameter of an option in words.
func value(v remedies.Value) string {
	decimals := 0
	switch v.Unit {
	case "1V:nH":
		decimals = 1
	case "m":
		decimals = 2
	case "m/s": // A permeability or a recharge is a power of ten.
		return v.Words(strings.Replace(strconv.FormatFloat(v.Value, 'g', 3, 64), "e-0", "e-", 1))
	}
	return v.Words(number(v.Value, decimals))
}

// methodName writes a method of slices as people spell it.
func methodName(m lem.Method) string {
	if m == lem.MorgensternPrice {
		return "Morgenstern-Price"
	}
	return title(m.String())
}

// title writes a word, in any alphabet, with a capital.
func title(s string) string {
	first, n := utf8.DecodeRuneInString(s)
	if n == 0 {
		return s
	}
	return string(unicode.ToUpper(first)) + s[n:]
}
