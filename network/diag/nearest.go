package diag

import (
	"strings"
	"unicode"
)

// The weights of the distance between two words. A change of case is a slip
// too, but a lesser one.
const (
	slip     = 4
	caseSlip = 1
	// longestWord bounds the work; names longer than this get no proposal.
	longestWord = 64
)

// Nearest returns the name in known that word was most likely meant to be, or
// "" if none is near. Of equally near names the first wins. The words may
// differ by one slip for each three characters, at least one and at most three;
// a slip is a character left out, put in, changed, or swapped with its
// neighbour, and a change of case counts a quarter. A name that shares no
// character with word is never proposed.
//
// The work grows with len(known); a caller with very many unknown words should
// stop asking after some hundreds.
//
// Method: Damerau, Communications of the ACM 7 (1964) 171; Levenshtein, Soviet
// Physics Doklady 10 (1966) 707; in the form that never edits a swapped pair
// again. From memory.
func Nearest(word string, known []string) string {
	w := []rune(firstBytes(word))
	if len(w) == 0 || len(w) > longestWord {
		return ""
	}
	limit := slip * max(1, min(3, len(w)/3))
	limit = min(limit, slip*len(w)-1)
	best, bestCost := "", limit+1
	var buffer [longestWord]rune
	for _, name := range known {
		if strings.EqualFold(word, name) && bestCost > caseSlip && name != "" {
			best, bestCost = name, caseSlip
			continue
		}
		n, ok := runes(buffer[:0], name)
		if !ok || slip*abs(len(n)-len(w)) >= bestCost {
			continue
		}
		if cost := distance(w, n); cost < bestCost {
			best, bestCost = name, cost
		}
	}
	return best
}

// firstBytes cuts a word that is too long in any case, before it is copied.
func firstBytes(word string) string { return word[:min(len(word), 4*longestWord+4)] }

// runes appends the characters of name to dst; ok is false when they are too many.
func runes(dst []rune, name string) (out []rune, ok bool) {
	for _, r := range name {
		if len(dst) == longestWord {
			return dst, false
		}
		dst = append(dst, r)
	}
	return dst, true
}

func abs(n int) int { return max(n, -n) }

// distance is the weighted number of slips between a and b, both of at most
// longestWord characters.
func distance(a, b []rune) int {
	var rows [3][longestWord + 1]int
	older, old, now := &rows[0], &rows[1], &rows[2]
	for j := range len(b) + 1 {
		old[j] = slip * j
	}
	for i := 1; i <= len(a); i++ {
		now[0] = slip * i
		for j := 1; j <= len(b); j++ {
			cost := min(old[j]+slip, now[j-1]+slip, old[j-1]+change(a[i-1], b[j-1]))
			if i > 1 && j > 1 && a[i-1] == b[j-2] && a[i-2] == b[j-1] {
				cost = min(cost, older[j-2]+slip)
			}
			now[j] = cost
		}
		older, old, now = old, now, older
	}
	return old[len(b)]
}

// change is the cost of writing b for a.
func change(a, b rune) int {
	switch {
	case a == b:
		return 0
	case unicode.ToLower(a) == unicode.ToLower(b):
		return caseSlip
	}
	return slip
}
