package main

import (
	"slices"
	"strconv"
	"strings"
	"time"

	"github.com/urfave/cli/v2"

	"lastdrop/cmd/internal/night"
	"lastdrop/cmd/internal/refit"
	"lastdrop/cmd/internal/schemaview"
	"lastdrop/report/pdf"
)

const sweepHelp = "lastdrop sweep --help"

// request reads and checks all options of a sweep before anything is touched.
// The request is there with an error too.
func (p *program) request(c *cli.Context) (*request, error) {
	r := &request{json: c.Bool("json"), quiet: c.Bool("quiet"), curves: c.Bool("curves"), failOn: splitAll(c.StringSlice("fail-on"))}
	r.night = night.Options{
		Folders: c.Args().Slice(), Into: c.String("into"), MinAge: c.Duration("min-age"), Now: p.now,
		Workers: c.Int("workers"), Laboratory: c.String("laboratory"), Estimator: c.String("estimator"),
		Lastdrop: version, Limits: refit.Limits(),
	}
	r.pages = pdf.Options{Letter: c.String("paper") == "letter", Pages: c.String("pages")}
	if err := r.check(c); err != nil {
		return r, err
	}
	var err error
	if r.night.Date, err = p.publicationDate(); err != nil {
		return r, err
	}
	if r.set, err = schemaSet(c.String("schemas")); err != nil {
		return r, err
	}
	r.night.Refit, r.night.Origins = evaluator(r.night.Estimator, r.set), schemaview.Origins(r.set)
	for _, list := range []struct {
		option string
		to     *[]night.Pattern
	}{{"include", &r.night.Include}, {"exclude", &r.night.Exclude}} {
		if *list.to, err = patterns(list.option, c.StringSlice(list.option)); err != nil {
			return r, err
		}
	}
	return r, nil
}

func patterns(option string, texts []string) (all []night.Pattern, err error) {
	for _, s := range texts {
		p, err := night.ParsePattern(s)
		if err != nil {
			return nil, usage(sweepHelp, "--%s %v", option, err)
		}
		all = append(all, p)
	}
	return all, nil
}

func (r *request) check(c *cli.Context) error {
	switch {
	case len(r.night.Folders) == 0:
		return usage("lastdrop sweep FOLDER --into OUT", "no folder to sweep")
	case r.night.Into == "":
		return usage("lastdrop sweep "+strings.Join(r.night.Folders, " ")+" --into OUT", "no OUT to publish into")
	case r.night.MinAge < 0:
		return usage(sweepHelp, "--min-age %s is negative; dumps of any age are taken from 0s on", r.night.MinAge)
	case c.IsSet("workers") && r.night.Workers < 1:
		return usage(sweepHelp, "--workers %d is less than 1", r.night.Workers)
	}
	for _, what := range r.failOn {
		if err := oneOf("fail-on", what, "unread", "disputed", "doubtful"); err != nil {
			return err
		}
	}
	if err := oneOf("pages", c.String("pages"), "flagged", "all"); err != nil {
		return err
	}
	if err := oneOf("paper", c.String("paper"), "a4", "letter"); err != nil {
		return err
	}
	var err error
	if r.pages.Decimal, err = decimalOf(c); err != nil {
		return err
	}
	return checkEstimator(r.night.Estimator)
}

func checkEstimator(name string) error {
	if name == "" {
		return nil
	}
	return oneOf("estimator", name, refit.Estimators()...)
}

func oneOf(option, value string, allowed ...string) error {
	if slices.Contains(allowed, value) {
		return nil
	}
	return usage(sweepHelp, "--%s %q is not known; it is one of %s", option, value, strings.Join(allowed, ", "))
}

// splitAll takes "unread,disputed" for two values: no value of ours holds a
// comma.
func splitAll(values []string) (all []string) {
	for _, v := range values {
		all = append(all, strings.Split(v, ",")...)
	}
	return all
}

// publicationDate is the day that the night is published on: the local one,
// or the day of SOURCE_DATE_EPOCH (seconds since 1970, UTC) where that is set,
// so that a night can be made again.
func (p *program) publicationDate() (string, error) {
	epoch := p.getenv("SOURCE_DATE_EPOCH")
	if epoch == "" {
		return p.now().Format(time.DateOnly), nil
	}
	seconds, err := strconv.ParseInt(epoch, 10, 64)
	if err != nil || seconds < 0 || time.Unix(seconds, 0).UTC().Year() > 9999 {
		return "", usage("unset SOURCE_DATE_EPOCH", "SOURCE_DATE_EPOCH %q is not a count of seconds since 1970", epoch)
	}
	return time.Unix(seconds, 0).UTC().Format(time.DateOnly), nil
}
