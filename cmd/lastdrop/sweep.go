package main

import (
	"fmt"
	"log/slog"
	"slices"
	"strings"

	"github.com/urfave/cli/v2"

	"lastdrop/cmd/internal/night"
	"lastdrop/cmd/internal/refit"
	"lastdrop/report"
	"lastdrop/report/pdf"
	"lastdrop/report/terminal"
	"lastdrop/schemas"
)

func (p *program) sweepCommand() *command {
	return &command{
		name: "sweep", use: "FOLDER… --into OUT",
		says: "refit every dump of the folders and publish one night",
		more: "Reads the dumps (*.csv, *.txt, *.tsv, *.dat, and those in *.zip and *.gz) in FOLDER and below, refits every endpoint from the raw readings, and writes summary.xlsx, summary.pdf (with more than 200 pages of runs also summary-2.pdf and so on), evaluations.jsonl, unread.jsonl, waiting.jsonl and last-sweep.txt into OUT: all of them or none. A FOLDER may also be one dump or one archive. The summary stands on stdout. A dump is never changed. " +
			"Exit: 0 done, whatever was found; 1 could not finish; 2 usage; 4 --fail-on found something; 6 no dump; 75 another sweep is at work in OUT; 130, 143 stopped.",
		example: []string{
			"lastdrop sweep /srv/titrations --into /srv/nights",
			"lastdrop sweep bench-a bench-b --into out --min-age 15m --fail-on disputed",
			"lastdrop sweep /srv/dumps --into out --include 'dumps/bench-a' --exclude old",
		},
		options: sweepOptions(),
		action:  p.sweep,
	}
}

func sweepOptions() []option {
	return []option{
		{flag: &cli.StringFlag{Name: "into"}, value: "OUT", says: "folder that the night is written into, made when missing; it belongs to lastdrop and lies outside every FOLDER", example: "--into /srv/nights"},
		schemasOption(),
		{flag: &cli.StringSliceFlag{Name: "include"}, value: "PATTERN", says: "take only dumps that it matches. * stands for any text within a name, ? for one sign, ** for any folders. Without / it is held against the names of the dump and of each folder and archive around it; with / against the dump's name as reports print it, or the beginning of that. May be given again", without: "all dumps", example: "--include '*.csv'"},
		{flag: &cli.StringSliceFlag{Name: "exclude"}, value: "PATTERN", says: "leave out dumps that it matches, also included ones; may be given again", without: "none", example: "--exclude 'titrations/**/old'"},
		{flag: &cli.StringFlag{Name: "estimator"}, value: "NAME", says: "use this estimator for every run: " + strings.Join(refit.Estimators(), ", "), without: "each run has the usual one for its readings"},
		{flag: &cli.DurationFlag{Name: "min-age"}, value: "TIME", says: "younger dumps wait for the next sweep; s, m or h stand behind the number", without: "0s", example: "--min-age 15m"},
		{flag: &cli.StringSliceFlag{Name: "fail-on"}, value: "WHAT", says: "exit with 4 when there is one: unread, disputed, or doubtful (disputed ones too); may be given again", without: "0 whatever was found"},
		{flag: &cli.StringFlag{Name: "pages", Value: "flagged"}, value: "WHICH", says: "runs that get a page of their own: flagged (disputed and doubtful) or all", without: "flagged"},
		{flag: &cli.BoolFlag{Name: "curves"}, says: "a sheet Curves in the workbook: readings and computed curve of the runs that have a page, with a chart for the first 50"},
		{flag: &cli.StringFlag{Name: "paper", Value: "a4"}, value: "SHEET", says: "a4 or letter", without: "a4"},
		decimalOption("pages and summary"),
		{flag: &cli.StringFlag{Name: "laboratory"}, value: "NAME", says: "name on every page", without: "none", example: `--laboratory "Quay Road"`},
		{flag: &cli.IntFlag{Name: "workers"}, value: "N", says: "dumps refitted at the same time, from 1 on; the night is the same with any", without: "one a processor"},
		{flag: &cli.BoolFlag{Name: "json"}, says: "one JSON object with counts and files on stdout instead of the summary"},
		{flag: &cli.BoolFlag{Name: "quiet"}, says: "no summary and no warnings; errors only"},
	}
}

// request is a sweep as it was asked for.
type request struct {
	night  night.Options
	set    []*schemas.Schema // in force
	pages  pdf.Options
	failOn []string
	curves bool
	json   bool
	quiet  bool
}

// sweep carries out the command.
func (p *program) sweep(c *cli.Context) error {
	r, err := p.request(c)
	if err != nil && r.json {
		return p.printJSON(r, nil, err)
	}
	if err != nil {
		return err
	}
	var pages []pdf.Result
	r.night.Outputs, r.night.Own = outputs(r.pages, r.curves, &pages), isOutput
	r.night.Log = slog.New(warnings{p: p, quiet: r.quiet})
	tellReplaced(r.night.Log, r.set)
	result, err := night.Sweep(c.Context, r.night)
	if err == nil {
		tellPages(r.night.Log, pages)
		p.tellUnread(r, result)
		if err = p.summary(r, result, len(pages)); err == nil {
			err = found(result.Night, r.failOn)
		}
	}
	if code := exitCode(err); code != exitUsage && code != exitInUse {
		err = p.last(r, result, err)
	}
	if r.json {
		return p.printJSON(r, result, err)
	}
	return err
}

// last rewrites last-sweep.txt, and returns err or why that failed.
func (p *program) last(r *request, result *night.Result, err error) error {
	l := night.Last{At: p.now(), Lastdrop: version, Exit: exitCode(err), Result: result}
	if err != nil {
		l.Says = err.Error()
	}
	if failed := l.Write(r.night.Into); failed != nil && err == nil {
		return &failure{err: fmt.Errorf("the night is published, %s is not: %w", night.LastSweep, failed),
			try: "make room or check the permissions of " + r.night.Into}
	}
	return err
}

// summary prints what a timer mails.
func (p *program) summary(r *request, result *night.Result, volumes int) error {
	if r.json || r.quiet {
		return nil
	}
	return terminal.Summary(p.stdout, result.Night, terminal.SummaryOptions{Files: result.Files, Volumes: volumes, Decimal: r.pages.Decimal})
}

// tellPages warns of pages that could not be drawn and of signs that were
// replaced.
func tellPages(log *slog.Logger, volumes []pdf.Result) {
	var replaced []string
	for i, pages := range volumes {
		for _, f := range pages.Failed {
			log.Warn("a page could not be drawn; one that says so stands in its place", "file", pdf.FileName(i+1), "page", f.Page, "of", f.What, "cause", f.Says)
		}
		replaced = append(replaced, pages.Replaced...)
	}
	if n := len(replaced); n > 0 {
		log.Warn("signs that the font has not were replaced", "texts", n, "first", replaced[0])
	}
}

// tellUnread gives the exact command that looks at the first unread dump. The
// published files cannot: they do not know where the folders lie.
func (p *program) tellUnread(r *request, result *night.Result) {
	if n := len(result.Night.Unread); n > 0 && !r.quiet {
		first := &result.Night.Unread[0]
		command := "look "
		if strings.HasPrefix(first.Next, "lastdrop schema draft ") {
			command = "schema draft "
		}
		p.say("try: lastdrop %s%s", command, shellWord(result.Path(first.Dump)))
	}
}

// found is the error of a night that holds what --fail-on names.
func found(n *report.Night, failOn []string) error {
	disputed, doubtful := n.Count(report.VerdictDisputed), n.Count(report.VerdictDoubtful)
	var said []string
	for _, what := range failOn {
		count, noun := 0, ""
		switch what {
		case "unread":
			count, noun = len(n.Unread), "unread"
		case "disputed":
			count, noun = disputed, "disputed"
		case "doubtful":
			count, noun = doubtful+disputed, "doubtful or disputed"
		}
		if count > 0 {
			said = append(said, fmt.Sprintf("%d %s", count, noun))
		}
	}
	if len(said) == 0 {
		return nil
	}
	return &foundError{msg: "the night is published; --fail-on found " + strings.Join(said, ", ")}
}

// tellReplaced names the shipped schemas that the laboratory's own replace.
func tellReplaced(log *slog.Logger, set []*schemas.Schema) {
	var names []string
	for _, s := range set {
		if s.Replaces && !slices.Contains(names, s.Name) {
			names = append(names, s.Name)
		}
	}
	if len(names) > 0 {
		log.Warn("the laboratory's own schemas stand in the place of shipped ones", "schemas", strings.Join(names, ", "))
	}
}

// evaluator is the refit of every dump with the schemas.
func evaluator(estimator string, set []*schemas.Schema) night.Refit {
	o := refit.Options{Estimator: estimator, Lastdrop: version}
	return func(data []byte, name, sha string) ([]report.Evaluation, []report.Unread) {
		return refit.Dump(data, name, sha, set, o)
	}
}
