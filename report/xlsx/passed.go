package xlsx

import (
	"fmt"

	"lastdrop/report"
)

// passedRows is how many rows layPassed writes.
func passedRows(n *report.Night) int { return len(n.Gaps) + len(n.Links) + len(n.Specials) }

// layPassed tells what was not read without being unread: run numbers that no
// file bears, and what the sweep did not follow or open.
func layPassed(s *sheet, n *report.Night) {
	row := func(state, name, found, do string) {
		s.put(0, text(state), wrapped(name), cell{}, cell{}, cell{}, cell{}, wrapped(found), wrapped(do), cell{}, cell{}, cell{})
	}
	for _, g := range n.Gaps {
		found := "no file bears this run number"
		if g.Count > 1 {
			found = fmt.Sprintf("no file bears these %d run numbers", g.Count)
		}
		row("gap", g.Name, fmt.Sprintf("%s, between %s and %s", found, g.After, g.Before), "look whether the run was aborted or its export is lost")
	}
	for _, name := range n.Links {
		row("link", name, "symbolic link, not followed", "sweep the folder that it points to")
	}
	for _, name := range n.Specials {
		row("special", name, "pipe, socket or device, not opened", "move it out of the folder of dumps")
	}
}
