package night

import (
	"cmp"
	"fmt"
	"maps"
	"path"
	"slices"
	"sort"
	"strconv"
	"strings"

	"lastdrop/report"
)

// A gap is a run number that no file bears, told by file names alone. It is told only where the numbers
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

// counter is all that is known of one series: its numbers, each with the
// SHA-256 of the dump that bears it, "" where a file is no dump or was not read.
type counter map[uint64]string

// gaps lists the numbers that are missing between the dumps, which are given
// with their SHA-256. present are all names that were met, of other files too:
// a number that any file bears is not missing.
func gaps(dumps map[string]string, present []string) (found []report.Gap) {
	counted, there := map[series][]numbered{}, map[series]counter{}
	for _, name := range present {
		s, n, ok := numberOf(name)
		if !ok {
			continue
		}
		if there[s] == nil {
			there[s] = counter{}
		}
		sha, isDump := dumps[name]
		if there[s][n.number] == "" {
			there[s][n.number] = sha
		}
		if isDump {
			counted[s] = append(counted[s], n)
		}
	}
	all := slices.SortedFunc(maps.Keys(counted), func(a, b series) int {
		return cmp.Or(strings.Compare(a.folder, b.folder), strings.Compare(a.prefix, b.prefix), strings.Compare(a.width, b.width))
	})
	told := map[series][]report.Gap{}
	for i, s := range all {
		if len(counted[s]) < gapsFrom {
			continue
		}
		for _, g := range s.gaps(counted[s], s.shared(there)) {
			twin := slices.ContainsFunc(all[:i], func(before series) bool {
				return before.counts(s, there) && slices.ContainsFunc(told[before], func(o report.Gap) bool { return path.Base(o.Name) == path.Base(g.Name) })
			})
			if !twin {
				found = append(found, g)
			}
			told[s] = append(told[s], g)
		}
	}
	sort.SliceStable(found, func(i, j int) bool { return found[i].Name < found[j].Name })
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

// counts reports whether two folders may count together: benches with one
// counter, or copies of one folder. They do not when one number is of
// different dumps.
func (s series) counts(other series, there map[series]counter) bool {
	if other.prefix != s.prefix || other.width != s.width {
		return false
	}
	for n, sha := range there[s] {
		if theirs := there[other][n]; sha != "" && theirs != "" && sha != theirs {
			return false
		}
	}
	return true
}

// shared are the numbers of the series and of every one that may count
// together with it: files are moved, copied and packed.
func (s series) shared(there map[series]counter) map[uint64]bool {
	all := map[uint64]bool{}
	for other, numbers := range there {
		if !s.counts(other, there) {
			continue
		}
		for n := range numbers {
			all[n] = true
		}
	}
	return all
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
	if last-first >= gapsOneIn*uint64(len(there)) {
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
