package recipe

import "strings"

// Nearest returns the candidate closest in spelling, "" when none is near: within
// a third of the longer word's length, transpositions counting once (Damerau
// 1964, Commun. ACM 7, 171). Ties go to the first.
func Nearest(word string, candidates []string) string {
	best, at := 1<<30, ""
	w := []rune(strings.ToLower(word))
	if len(w) > 60 {
		return ""
	}
	for _, c := range candidates {
		r := []rune(strings.ToLower(c))
		longer := max(len(w), len(r))
		if len(r) > 80 || abs(len(r)-len(w)) >= best || abs(len(r)-len(w)) > longer/3+1 {
			continue
		}
		d := editDistance(w, r)
		if limit := max(1, longer/3); d < best && d <= limit {
			best, at = d, c
		}
	}
	return at
}

func abs(n int) int {
	if n < 0 {
		return -n
	}
	return n
}

func editDistance(a, b []rune) int {
	before, last, this := make([]int, len(b)+1), make([]int, len(b)+1), make([]int, len(b)+1)
	for j := range last {
		last[j] = j
	}
	for i := 1; i <= len(a); i++ {
		this[0] = i
		for j := 1; j <= len(b); j++ {
			cost := 1
			if a[i-1] == b[j-1] {
				cost = 0
			}
			this[j] = min(last[j]+1, this[j-1]+1, last[j-1]+cost)
			if i > 1 && j > 1 && a[i-1] == b[j-2] && a[i-2] == b[j-1] {
				this[j] = min(this[j], before[j-2]+1)
			}
		}
		before, last, this = last, this, before
	}
	return last[len(b)]
}
