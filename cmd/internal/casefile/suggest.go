package casefile

import (
	"fmt"
	"strings"
)

// didYouMean returns what to write instead of word: the candidate that it looks like, or all of them.
func didYouMean(word string, candidates []string) string {
	if near := nearest(word, candidates); near != "" {
		return fmt.Sprintf("did you mean `%s`?", near)
	}
	if len(candidates) == 0 {
		return ""
	}
	return "write " + orList(candidates)
}

// leastStem is the number of letters with which a word that begins as another does is taken for it.
const leastStem = 3

// nearest returns the candidate that word is most likely a slip of the pen for; "" if none is near.
func nearest(word string, candidates []string) string {
	best, bestDistance := "", 0
	w := plainWord(word)
	for _, c := range candidates {
		p := plainWord(c)
		d := editDistance(w, p)
		if d > max(1, min(len(w), len(p))/3) {
			if min(len(w), len(p)) < leastStem || !strings.HasPrefix(w, p) && !strings.HasPrefix(p, w) {
				continue
			}
		}
		if best == "" || d < bestDistance {
			best, bestDistance = c, d
		}
	}
	return best
}

// plainWord drops what people do not see as a difference: case, and how words are joined.
func plainWord(s string) string {
	return strings.NewReplacer("_", " ", "-", " ").Replace(strings.ToLower(strings.TrimSpace(s)))
}

// maxCompared bounds the characters of a word that are compared, so that a huge word costs nothing.
const maxCompared = 64

// editDistance returns the least number of letters inserted, dropped, changed or swapped with a neighbour that turns a into b
// (optimal string alignment; Damerau 1964, Levenshtein 1966).
func editDistance(a, b string) int {
	s, t := []rune(a), []rune(b)
	s, t = s[:min(len(s), maxCompared)], t[:min(len(t), maxCompared)]
	rows := make([][]int, len(s)+1)
	for i := range rows {
		rows[i] = make([]int, len(t)+1)
		rows[i][0] = i
	}
	for j := range t {
		rows[0][j+1] = j + 1
	}
	for i := range s {
		for j := range t {
			change := rows[i][j]
			if s[i] != t[j] {
				change++
			}
			d := min(change, rows[i][j+1]+1, rows[i+1][j]+1)
			if i > 0 && j > 0 && s[i] == t[j-1] && s[i-1] == t[j] {
				d = min(d, rows[i-1][j-1]+1)
			}
			rows[i+1][j+1] = d
		}
	}
	return rows[len(s)][len(t)]
}

// orList returns the words quoted, as "`a`, `b` or `c`".
func orList(words []string) string { return quotedList(words, "or") }

// andList returns the words quoted, as "`a`, `b` and `c`".
func andList(words []string) string { return quotedList(words, "and") }

func quotedList(words []string, join string) string {
	quoted := make([]string, len(words))
	for i, w := range words {
		quoted[i] = "`" + w + "`"
	}
	if len(quoted) < 2 {
		return strings.Join(quoted, "")
	}
	last := len(quoted) - 1
	return strings.Join(quoted[:last], ", ") + " " + join + " " + quoted[last]
}
