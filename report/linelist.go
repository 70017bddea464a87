package report

import (
	"sort"
	"strconv"
	"strings"
)

// LineList writes lines of a dump for people: "line 42", "lines 18 to 21 and
// 40"; "" for none. The given slice stays as it is.
func LineList(lines []int) string {
	if len(lines) == 0 {
		return ""
	}
	stretches := stretchesOf(lines)
	noun := "lines "
	if len(stretches) == 1 && !strings.Contains(stretches[0], " ") {
		noun = "line "
	}
	last := len(stretches) - 1
	if last == 0 {
		return noun + stretches[0]
	}
	return noun + strings.Join(stretches[:last], ", ") + " and " + stretches[last]
}

// stretchesOf joins three or more lines in a row to one stretch.
func stretchesOf(lines []int) (stretches []string) {
	sorted := append([]int(nil), lines...)
	sort.Ints(sorted)
	for i := 0; i < len(sorted); {
		k := i
		for k+1 < len(sorted) && sorted[k+1]-sorted[k] <= 1 {
			k++
		}
		if sorted[k]-sorted[i] >= 2 {
			stretches = append(stretches, strconv.Itoa(sorted[i])+" to "+strconv.Itoa(sorted[k]))
		} else {
			for v := sorted[i]; v <= sorted[k]; v++ {
				stretches = append(stretches, strconv.Itoa(v))
			}
		}
		i = k + 1
	}
	return stretches
}
