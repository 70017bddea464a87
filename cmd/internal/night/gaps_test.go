package night

import (
	"fmt"
	"slices"
	"strings"
	"testing"
)

// count17 are the dumps 0401 to 0417 of a folder without those left out.
func count17(folder string, without ...int) (names []string) {
next:
	for n := 401; n <= 417; n++ {
		for _, w := range without {
			if n == w {
				continue next
			}
		}
		names = append(names, fmt.Sprintf("%s/%04d.csv", folder, n))
	}
	return names
}

func gapsOf(dumps, others []string) string {
	shas := map[string]string{}
	for _, name := range dumps {
		shas[name] = name // every dump is another one
		if strings.Contains(name, "copy") {
			shas[name] = strings.Replace(name, "copy", "a", 1)
		}
	}
	var said []string
	for _, g := range gaps(shas, slices.Concat(dumps, others)) {
		said = append(said, fmt.Sprintf("%s (%d, between %s and %s)", g.Name, g.Count, g.After, g.Before))
	}
	return strings.Join(said, "\n")
}

func TestGaps(t *testing.T) {
	days := []string{}
	for d := 1; d <= 30; d++ { // 4 Sundays are missing
		if d%7 != 6 {
			days = append(days, fmt.Sprintf("d/203104%02d.csv", d), fmt.Sprintf("e/3104%02d.csv", d), fmt.Sprintf("f/2031-1%02d.csv", d), fmt.Sprintf("g/2031-04-%02d.csv", d))
		}
	}
	for _, c := range []struct {
		what          string
		dumps, others []string
		want          string
	}{
		{"none", count17("d/a"), nil, ""},
		{"one", count17("d/a", 409), nil, "d/a/0409 (1, between 0408.csv and 0410.csv)"},
		{"two places", count17("d/a", 403, 409, 410), nil,
			"d/a/0403 (1, between 0402.csv and 0404.csv)\nd/a/0409 to 0410 (2, between 0408.csv and 0411.csv)"},
		{"at the ends nobody knows", count17("d/a", 401, 417), nil, ""},
		{"borne by a file that is no dump", count17("d/a", 409), []string{"d/a/0409.bmp"}, ""},
		{"moved to another folder", count17("d/a", 409), []string{"d/incoming/0409.csv"}, ""},
		{"moved into an archive", count17("d/a", 409), []string{"d/old.zip/0409.csv"}, ""},
		{"another bench with numbers of its own", append(count17("d/a", 409), count17("d/b")...), nil, "d/a/0409 (1, between 0408.csv and 0410.csv)"},
		{"a folder and its copy", append(count17("d/a", 409), count17("d/copy", 409)...), nil, "d/a/0409 (1, between 0408.csv and 0410.csv)"},
		{"a copy that has it", append(count17("d/a", 409), count17("d/copy")...), nil, ""},
		{"two benches that count together", append(count17("d/a", 409, 412), "d/b/0409.csv", "d/b/0412.csv"), nil, ""},
		{"five names, one in six missing", []string{"a/001.csv", "a/002.csv", "a/003.csv", "a/005.csv", "a/006.csv"}, nil, "a/004 (1, between 003.csv and 005.csv)"},
		{"four names", []string{"a/001.csv", "a/002.csv", "a/003.csv", "a/005.csv"}, nil, ""},
		{"4 of 17 missing, 24 %", count17("d/a", 403, 405, 409, 410), nil, ""},
		{"other widths", []string{"a/1.csv", "a/2.csv", "a/4.csv", "a/5.csv", "a/6.csv", "a/7.csv"}, nil, ""},
		{"days", days, nil, ""},
		{"some could be days", []string{"a/001227.csv", "a/001228.csv", "a/001229.csv", "a/001230.csv", "a/001231.csv", "a/001232.csv", "a/001234.csv"}, nil, "a/001233 (1, between 001232.csv and 001234.csv)"},
		{"no number at the end", []string{"a/001x.csv", "a/002x.csv", "a/003x.csv", "a/004x.csv", "a/006x.csv"}, nil, ""},
		{"far away", append(count17("d/a"), "d/a/9999.csv"), nil, ""},
		{"letters before", []string{"a/run-001.csv", "a/run-002.csv", "a/run-003.csv", "a/run-004.txt", "a/run-006.csv"}, nil, "a/run-005 (1, between run-004.txt and run-006.csv)"},
		{"largest numbers", []string{"a/999999999999999999.csv", "a/000000000000000001.csv", "a/000000000000000002.csv", "a/000000000000000003.csv", "a/000000000000000004.csv"}, nil, ""},
	} {
		equal(t, c.what, gapsOf(c.dumps, c.others), c.want)
	}
}
