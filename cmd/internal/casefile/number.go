package casefile

import (
	"fmt"
	"math"
	"regexp"
	"strconv"
	"strings"

	"go.yaml.in/yaml/v4"
)

const numberPattern = `[-+]?(?:[0-9]+\.?[0-9]*|\.[0-9]+)(?:[eE][-+]?[0-9]+)?`

var (
	numberRule  = regexp.MustCompile(`^` + numberPattern + `$`)
	commaRule   = regexp.MustCompile(`^([-+]?[0-9]+),([0-9]+)$`)
	batterRule  = regexp.MustCompile(`^1(?:\.0*)?[Vv]?:([0-9.]+)[Hh]?$`)
	unitRule    = regexp.MustCompile(`^(` + numberPattern + `) ?([A-Za-z%°/^0-9³²]+)$`)
	percentRule = regexp.MustCompile(`^(` + numberPattern + `) ?%$`)
	rangeRule   = regexp.MustCompile(`^(` + numberPattern + `) +to +(` + numberPattern + `) +by +(` + numberPattern + `)$`)
	noStepRule  = regexp.MustCompile(`^(` + numberPattern + `) +to +(` + numberPattern + `)$`)
)

// problem is what is wrong with a value, in words, and what would be right.
type problem struct {
	message, suggestion string
	complete            bool // The message tells what would be right, so that no suggestion is needed.
}

// parseNumber reads a finite decimal number from a scalar.
func parseNumber(n *yaml.Node) (float64, *problem) {
	text := n.Value
	if n.Style&(yaml.SingleQuotedStyle|yaml.DoubleQuotedStyle) != 0 {
		p := &problem{message: fmt.Sprintf("%q is text, not a number", text)}
		if numberRule.MatchString(text) {
			p.suggestion = fmt.Sprintf("write %s without quotes", text)
		} else {
			p.suggestion = notANumber(text).suggestion
		}
		return 0, p
	}
	if numberRule.MatchString(text) {
		x, err := strconv.ParseFloat(text, 64)
		if err != nil {
			return 0, &problem{message: text + " is too large"}
		}
		return x, nil
	}
	return 0, notANumber(text)
}

// notANumber tells what people may have meant by text in the place of a number.
func notANumber(text string) *problem {
	switch strings.ToLower(strings.TrimLeft(text, "+-.")) {
	case "nan":
		return &problem{message: text + " is not a number", suggestion: "write the value"}
	case "inf", "infinity":
		return &problem{message: text + " is not a finite number", suggestion: "write the value"}
	}
	p := &problem{message: fmt.Sprintf("`%s` is not a number", clip(text))}
	switch {
	case commaRule.MatchString(text):
		p.suggestion = "write the decimals behind a point: " + commaRule.ReplaceAllString(text, "$1.$2")
	case batterRule.MatchString(text):
		p.suggestion = "write only the n of 1V:nH: " + batterRule.ReplaceAllString(text, "$1")
	case unitRule.MatchString(text):
		p.suggestion = "write the number alone: " + unitRule.ReplaceAllString(text, "$1")
	case numberRule.MatchString(strings.ReplaceAll(text, "_", "")):
		p.suggestion = "write " + strings.ReplaceAll(text, "_", "")
	}
	return p
}

// parseShare reads a share: a number from 0 to 1 or a percentage.
func parseShare(n *yaml.Node) (float64, *problem) {
	if m := percentRule.FindStringSubmatch(n.Value); m != nil {
		x, err := strconv.ParseFloat(m[1], 64)
		if err != nil || x < 0 || x > 100 {
			return 0, &problem{message: n.Value + " is outside 0% to 100%"}
		}
		return x / 100, nil
	}
	x, p := parseNumber(n)
	if p != nil {
		return 0, p
	}
	if x < 0 || x > 1 {
		p = &problem{message: n.Value + " is outside 0 to 1"}
		if x > 1 && x <= 100 {
			p.suggestion = fmt.Sprintf("for a percentage write %s%%", n.Value)
		}
		return 0, p
	}
	return x, nil
}

// size is what a remedy's parameter is given as: a fixed number (step 0), or from min to max by step.
type size struct{ min, max, step float64 }

// maxSizes bounds the values of one range; a finer lattice than this is never buildable.
const maxSizes = 1000

// stepSlack, in steps, is the float dust that counting the values of a range forgives.
const stepSlack = 1e-6

// count returns the number of values of the size.
func (s size) count() float64 {
	if s.step == 0 {
		return 1
	}
	return math.Floor((s.max-s.min)/s.step+stepSlack) + 1
}

// last returns the greatest value that the steps reach.
func (s size) last() float64 { return s.min + (s.count()-1)*s.step }

// parseSize reads a size: "2.5", or "2 to 4 by 0.1".
func parseSize(n *yaml.Node) (size, *problem) {
	if n.Style&(yaml.SingleQuotedStyle|yaml.DoubleQuotedStyle) == 0 && numberRule.MatchString(n.Value) {
		x, p := parseNumber(n)
		return size{x, x, 0}, p
	}
	if m := rangeRule.FindStringSubmatch(n.Value); m != nil {
		return checkRange(m)
	}
	if m := noStepRule.FindStringSubmatch(n.Value); m != nil {
		return size{}, &problem{
			message:    "the range has no step",
			suggestion: fmt.Sprintf("write `%s to %s by 0.1`, with the step that can be set out", m[1], m[2]),
		}
	}
	p := notANumber(n.Value)
	if p.suggestion == "" {
		p.message = fmt.Sprintf("`%s` is neither a number nor a range", clip(n.Value))
		p.suggestion = "write a number to fix it, or a range to size it: `2 to 4 by 0.1`"
	}
	return size{}, p
}

// checkRange checks a range "m[1] to m[2] by m[3]".
func checkRange(m []string) (size, *problem) {
	var v [3]float64
	for i := range v {
		x, err := strconv.ParseFloat(m[i+1], 64)
		if err != nil {
			return size{}, &problem{message: m[i+1] + " is too large"}
		}
		v[i] = x
	}
	s := size{v[0], v[1], v[2]}
	switch {
	case s.max < s.min:
		return s, &problem{message: "the range runs backwards", suggestion: fmt.Sprintf("write `%s to %s by %s`", m[2], m[1], m[3])}
	case !(s.step > 0):
		return s, &problem{
			message:    fmt.Sprintf("the step %s of the range is not above 0", m[3]),
			suggestion: "write a step that can be set out, such as 0.1",
		}
	case s.count() > maxSizes:
		return s, &problem{
			message:    fmt.Sprintf("the range has %.0f values; at most %d make sense", s.count(), maxSizes),
			suggestion: "write a step that can be set out, such as 0.1",
		}
	}
	if s.max == s.min {
		s.step = 0
	}
	return s, nil
}

// maxQuoted is the number of characters of a wrong value that a message quotes.
const maxQuoted = 40

// clip shortens a value that is quoted in a message.
func clip(s string) string {
	r := []rune(s)
	if len(r) <= maxQuoted {
		return s
	}
	return string(r[:maxQuoted]) + "…"
}

// round9 rounds to nine decimals, which takes the float dust off a sum of steps.
func round9(x float64) float64 { return math.Round(x*1e9) / 1e9 }
