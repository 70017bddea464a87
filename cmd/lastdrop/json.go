package main

import (
	"encoding/json"

	"lastdrop/cmd/internal/night"
	"lastdrop/report"
)

// sweepObject is what sweep --json prints. Counts and files are left out when
// no night was published; error and try when one was.
type sweepObject struct {
	Record   int          `json:"record"`
	Lastdrop string       `json:"lastdrop"`
	Exit     int          `json:"exit"`
	Date     string       `json:"date,omitempty"` // of the publication
	Into     string       `json:"into"`
	Counts   *sweepCounts `json:"counts,omitempty"`
	Files    []string     `json:"files,omitempty"`
	Error    string       `json:"error,omitempty"`
	Try      string       `json:"try,omitempty"`
}

type sweepCounts struct {
	Dumps      int `json:"dumps"` // found: read, unread and waiting
	Runs       int `json:"runs"`
	Disputed   int `json:"disputed"`
	Doubtful   int `json:"doubtful"`
	Sound      int `json:"sound"`
	Unread     int `json:"unread"` // dumps, or runs in them
	Waiting    int `json:"waiting"`
	OtherFiles int `json:"other_files"`
	Links      int `json:"links"`    // not followed
	Specials   int `json:"specials"` // pipes, sockets, devices
	LeftOut    int `json:"left_out"` // dumps, by --include and --exclude
	Gaps       int `json:"gaps"`     // places where run numbers are missing
}

// printJSON prints the one object and hands the error on: stderr and the exit
// code say the same as without --json.
func (p *program) printJSON(r *request, result *night.Result, err error) error {
	o := sweepObject{Record: report.Record, Lastdrop: version, Exit: exitCode(err), Into: r.night.Into}
	if err != nil && o.Exit != exitFound {
		o.Error, o.Try = err.Error(), nextStep(err)
	}
	if result != nil {
		n := result.Night
		o.Date, o.Files = n.Date, result.Files
		o.Counts = &sweepCounts{
			Dumps: result.Dumps, Runs: len(n.Evaluations), Disputed: n.Count(report.VerdictDisputed),
			Doubtful: n.Count(report.VerdictDoubtful), Sound: n.Count(report.VerdictSound),
			Unread: len(n.Unread), Waiting: len(n.Waiting), OtherFiles: n.OtherFiles,
			Links: len(n.Links), Specials: len(n.Specials), LeftOut: n.Excluded, Gaps: len(n.Gaps),
		}
	}
	to := json.NewEncoder(p.stdout)
	to.SetEscapeHTML(false)
	if failed := to.Encode(o); failed != nil && err == nil {
		return failed
	}
	return err
}
