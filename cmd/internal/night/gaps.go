package night

import (
	"fmt"
	"path"
	"slices"
	"sort"
	"strconv"
	"strings"

	"lastdrop/report"
)

// A gap is a run number that no file bears. It is told only where the numbers
// of a folder plainly count runs: at least gapsFrom dumps, of gapDigits digits
// or more, no days, and at most one number in gapsOneIn missing. Source: this
// project; a sequence with larger holes counts something else as well.
const (
	gapsFrom  = 5
	gapDigits = 3
	gapsOneIn = 5
)

// series are files of one folder whose names differ in a number at their end.
type series struct{ folder, prefix, width string }

// numbered is one number of a series and the file that bears it.
type numbered struct {
	number uint64
	name   string
	day    bool // it may be a day
}

// gaps lists the numbers that are missing between the dumps. present are all
// names that were met, of other files too: a number that any file bears is
// not missing.
func gaps(dumps, present []string) (found []report.Gap) {
	counted, there := map[series][]numbered{}, map[series]map[uint64]bool{}
	for _, name := range present {
		if s, n, ok := numberOf(name); ok {
			if there[s] == nil {
				there[s] = map[uint64]bool{}
			}
			there[s][n.number] = true
		}
	}
	for _, name := range dumps {
		if s, n, ok := numberOf(name); ok {
			counted[s] = append(counted[s], n)
		}
	}
	for s, numbers := range counted {
		found = append(found, s.gaps(numbers, s.shared(there))...)
	}
	sort.Slice(found, func(i, j int) bool { return found[i].Name < found[j].Name })
	return found
}

// numberOf parts a name such as dumps/bench-a/run-0417.csv.
func numberOf(name string) (s series, n numbered, ok bool) {
	base := path.Base(name)
	stem := strings.TrimSuffix(base, path.Ext(base))
	prefix := strings.TrimRight(stem, "0123456789")
	digits := stem[len(prefix):]
	const most = 18 // digits that a uint64 holds
	if len(digits) < gapDigits || len(digits) > most || isYear(prefix) {
		return s, n, false
	}
	number, err := strconv.ParseUint(digits, 10, 64)
	return series{path.Dir(name), prefix, strconv.Itoa(len(digits))}, numbered{number, base, isDay(digits)}, err == nil
}

// isDay is true for digits that may be a day, with the year before or behind,
// of two digits or four: weekends are no gaps.
func isDay(digits string) bool {
	part := func(from, to int) int {
		n, _ := strconv.Atoi(digits[from:to]) // digits only
		return n
	}
	switch len(digits) {
	case 6:
		return dayOf(part(2, 4), part(4, 6)) || dayOf(part(2, 4), part(0, 2)) || dayOf(part(0, 2), part(2, 4))
	case 8:
		return dayOf(part(4, 6), part(6, 8)) || dayOf(part(2, 4), part(0, 2)) || dayOf(part(0, 2), part(2, 4))
	}
	return false
}

func dayOf(month, day int) bool { return month >= 1 && month <= 12 && day >= 1 && day <= 31 }

// isYear is true where the number may be the day of a year: "2031-092".
func isYear(prefix string) bool {
	before := strings.TrimRight(prefix, "-_. ")
	return len(before) >= 4 && strings.Trim(before[len(before)-4:], "0123456789") == ""
}

// shared are the numbers of the series, with those of every folder whose
// numbers have none in common with it: files that were moved, or benches that
// count together.
func (s series) shared(there map[series]map[uint64]bool) map[uint64]bool {
	all := map[uint64]bool{}
	for n := range there[s] {
		all[n] = true
	}
	for other, numbers := range there {
		if other == s || other.prefix != s.prefix || other.width != s.width || overlap(numbers, there[s]) {
			continue
		}
		for n := range numbers {
			all[n] = true
		}
	}
	return all
}

func overlap(a, b map[uint64]bool) bool {
	for n := range a {
		if b[n] {
			return true
		}
	}
	return false
}

// gaps returns the gaps of one series, none when it does not plainly count
// runs.
func (s series) gaps(numbers []numbered, there map[uint64]bool) (found []report.Gap) {
	slices.SortFunc(numbers, func(a, b numbered) int {
		if a.number != b.number {
			return int(min(max(int64(a.number)-int64(b.number), -1), 1))
		}
		return strings.Compare(a.name, b.name)
	})
	if !slices.ContainsFunc(numbers, func(n numbered) bool { return !n.day }) {
		return nil
	}
	first, last := numbers[0].number, numbers[len(numbers)-1].number
	if len(numbers) < gapsFrom || last-first >= gapsOneIn*uint64(len(there)) {
		return nil
	}
	span, missing := last-first+1, uint64(0)
	for i := 1; i < len(numbers); i++ {
		before, after := numbers[i-1], numbers[i]
		for n := before.number + 1; n < after.number; n++ {
			if there[n] {
				continue
			}
			to := n
			for to+1 < after.number && !there[to+1] {
				to++
			}
			found = append(found, s.gap(n, to, before.name, after.name))
			missing += to - n + 1
			n = to
		}
	}
	if missing*gapsOneIn > span {
		return nil
	}
	return found
}

func (s series) gap(from, to uint64, before, after string) report.Gap {
	name := func(n uint64) string { return s.prefix + fmt.Sprintf("%0"+s.width+"d", n) }
	g := report.Gap{Name: s.folder + "/" + name(from), Count: int(to - from + 1), After: before, Before: after}
	if to > from {
		g.Name += " to " + name(to)
	}
	return g
}
