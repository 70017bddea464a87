package terminal

import (
	"strings"
	"testing"

	"lastdrop/report"
)

func TestMailTellsWhatWasPassedOver(t *testing.T) {
	n := &report.Night{Lastdrop: "0.1.0", Date: "2031-04-03", Excluded: 1,
		Links: []string{"dumps/a", "dumps/b\x1b[31m", "dumps/c", "dumps/d", "dumps/e", "dumps/f"}, Specials: []string{"dumps/pipe"},
		Gaps:    []report.Gap{{Name: "dumps/0419", Count: 1, After: "0418.csv", Before: "0420.csv"}, {Name: "dumps/0422 to 0423", Count: 2, After: "0421.csv", Before: "0424.csv"}},
		Schemas: []report.SchemaUse{{Name: "bench-a", From: report.ReplacesShipped}, {Name: "bench-x", From: report.Laboratory}, {Name: "plain", From: report.Shipped}}}
	got := strings.Join(strings.Fields(mail(t, n)), " ")
	for _, want := range []string{
		"Six symbolic links were not followed: dumps/a, dumps/b\uFFFD, dumps/c, dumps/d, and 2 more.",
		"One pipe, socket or device was not opened: dumps/pipe.",
		"One dump was left out by --include and --exclude.",
		"Three run numbers are missing between the dumps: dumps/0419, dumps/0422 to 0423. Aborted, or an export that is lost?",
		"Read with the laboratory's own schema in the place of the shipped one: bench-a.",
	} {
		if !strings.Contains(got, want) {
			t.Errorf("want %q in\n%s", want, mail(t, n))
		}
	}
}
