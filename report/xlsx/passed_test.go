package xlsx

import (
	"testing"

	"lastdrop/report"
)

func TestGapsAndLinksStandWithTheUnread(t *testing.T) {
	n := inventedNight()
	unread := len(n.Unread)
	n.Gaps = []report.Gap{{Name: "dumps/0419", Count: 1, After: "0418.csv", Before: "0420.csv"}, {Name: "dumps/0422 to 0423", Count: 2, After: "0421.csv", Before: "0424.csv"}}
	n.Links, n.Specials = []string{"dumps/=link"}, []string{"dumps/pipe"}
	rows := write(t, n).table(unreadSheet)
	if len(rows) != unread+4 {
		t.Fatalf("got %d rows, want %d unread and 4", len(rows), unread)
	}
	for i, want := range [][4]string{
		{"gap", "dumps/0419", "no file bears this run number, between 0418.csv and 0420.csv", "look whether the run was aborted or its export is lost"},
		{"gap", "dumps/0422 to 0423", "no file bears these 2 run numbers, between 0421.csv and 0424.csv", "look whether the run was aborted or its export is lost"},
		{"link", "dumps/=link", "symbolic link, not followed", "sweep the folder that it points to"},
		{"special", "dumps/pipe", "pipe, socket or device, not opened", "move it out of the folder of dumps"},
	} {
		row := rows[unread+i]
		if got := [4]string{row["state"], row["dump"], row["what was found"], row["what to do"]}; got != want {
			t.Errorf("row %d:\n got %q\nwant %q", i, got, want)
		}
	}
}
