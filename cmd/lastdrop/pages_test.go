package main

import (
	"os"
	"testing"

	"lastdrop/cmd/internal/demo"
	"lastdrop/report"
	"lastdrop/report/pdf"
)

// pagesSeeds is how many further demonstration nights are looked at: a few, or
// thirty where LASTDROP_LONG is set, as the gate does.
func pagesSeeds() uint64 {
	if os.Getenv("LASTDROP_LONG") != "" {
		return 30
	}
	return 4
}

// On no page of further nights, whatever the sheet and the mark, does a text
// leave its block or cross another text, a mark or a reading.
func TestPagesOfFurtherNights(t *testing.T) {
	for seed := demo.DefaultSeed; seed <= demo.DefaultSeed+pagesSeeds(); seed++ {
		n := sweepDemonstration(t, seed)
		for _, o := range []pdf.Options{{Pages: "all"}, {Pages: "all", Letter: true}, {}, {Letter: true, Decimal: report.DecimalComma}} {
			book, err := pdf.Plan(n.Night, o)
			if err != nil {
				t.Fatal(err)
			}
			const most = 5
			faults := book.Faults()
			for _, f := range faults[:min(len(faults), most)] {
				t.Errorf("seed %d, %+v: %s", seed, o, f)
			}
			if len(faults) > most {
				t.Errorf("seed %d, %+v: %d faults in all", seed, o, len(faults))
			}
		}
	}
}
