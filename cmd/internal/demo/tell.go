package demo

import (
	"bytes"
	"fmt"
	"strconv"
	"strings"
)

// truthTable writes one row for each run, and one for each dump without any.
// Several volumes of one cell are separated by a space.
func truthTable(all []Planted) []byte {
	var b bytes.Buffer
	b.WriteString("dump,run,sample,procedure,signal,kind,v0_ml,endpoints_ml,inflections_ml,at_reading_ml,planted,placed_ml,expected,flag,weight\n")
	for _, p := range all {
		run, v0, at, placed := "", "", "", ""
		if p.Run > 0 {
			run = strconv.Itoa(p.Run)
		}
		if p.V0ML > 0 {
			v0 = strconv.FormatFloat(p.V0ML, 'f', -1, 64)
		}
		if p.AtReadingML > 0 {
			at = fixed(p.AtReadingML, 4)
		}
		if p.PlacedML > 0 {
			placed = fixed(p.PlacedML, 2)
		}
		row := []string{p.Dump, run, p.Sample, p.Procedure, p.Signal, p.Kind, v0, volumes(p.EndpointsML), volumes(p.InflectionsML), at,
			string(p.Fault), placed, string(p.Expect), p.Flag, string(p.Weight)}
		b.WriteString(strings.Join(row, ",") + "\n")
	}
	return b.Bytes()
}

// volumes prints several volumes in mL.
func volumes(all []float64) string {
	words := make([]string, len(all))
	for i, v := range all {
		words[i] = fixed(v, 4)
	}
	return strings.Join(words, " ")
}

const readmeHead = `# Tern Island Preserves

**Everything in this folder is invented:** the laboratory, a maker of pickles and vinegar, its instruments
Bench A, B and C, its people, its samples and every reading. The curves were simulated with a known truth;
faults of real life were planted in the places told below. Nothing here is a measurement, and no value is a
limit or a specification of anything.

` + "`dumps/`" + ` holds one night, 2031-04-02, as three instruments and a shared folder left it:

| folder | what |
|---|---|
| bench-a | one run a file, "key;value" lines, decimal commas, Windows-1252; some exported as plain tables |
| bench-b | several runs a file one below the other, tabs, UTF-16 |
| bench-c | one long table a shift, the facts of each run in its foot; conductivity |
| incoming | what was exported a second time, and what is no dump of these benches |

` + "`truth.csv`" + ` has one row for each run: its true endpoints (equivalence), its steepest places, where the set
reading is passed, what was planted, where on the curve, and what should become of it. Volumes are in mL.

## Try it

    lastdrop sweep dumps --into out

## Procedures

| procedure | what | titrant | endpoints |
|---|---|---|---|
`

// readme tells the whole laboratory. It is made from the planted list itself.
func readme(n *night) []byte {
	var b bytes.Buffer
	b.WriteString(readmeHead)
	for _, p := range procedures() {
		fmt.Fprintf(&b, "| %s | %s | %s %s mol/L | %d |\n", p.name, p.what, p.titrant, fixed(p.molPerL, 1), len(p.ends)+len(p.salts))
	}
	dumps, runs, clean := map[string]bool{}, 0, 0
	for _, p := range n.planted {
		if p.Expect != ExpectCounted {
			dumps[p.Dump] = true
		}
		if p.Run > 0 && p.Expect != ExpectUnread && p.Expect != ExpectAlso {
			runs++
		}
		if p.Fault == Clean {
			clean++
		}
	}
	fmt.Fprintf(&b, "\n## Planted faults\n\n%d dumps with %d runs that can be read; %d runs are clean and should be sound. The others, in the order of\nthe night's folders (the weight is the least one; seed %d):\n\n", len(dumps), runs, clean, n.seed)
	b.WriteString("| dump | run | sample | what was done | what should be seen | flag | weight |\n|---|---|---|---|---|---|---|\n")
	for _, p := range n.planted {
		if p.Fault != Clean {
			b.WriteString(readmeRow(p))
		}
	}
	return b.Bytes()
}

// readmeRow is one row of the table of faults.
func readmeRow(p Planted) string {
	s := tell(p.Fault)
	run, did, see, flag, weight := "", s.did, s.see, p.Flag, string(p.Weight)
	if p.PlacedML > 0 {
		did += ", near " + fixed(p.PlacedML, 2) + " mL"
	}
	if p.Run > 0 {
		run = strconv.Itoa(p.Run)
	}
	if p.Expect == ExpectAlso {
		did, see = "another export of "+p.Sample+" of bench-a", "named beside the first export of the run"
	}
	if flag == "" {
		flag, weight = "–", string(p.Expect)
	}
	return fmt.Sprintf("| %s | %s | %s | %s | %s | %s | %s |\n", p.Dump, run, p.Sample, did, see, flag, weight)
}
