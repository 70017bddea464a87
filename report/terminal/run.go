package terminal

import (
	"strconv"
	"strings"

	"lastdrop/ingest"
	"lastdrop/report"
)

// run writes one run: what happened, the figures, the curve, why, what each
// estimator says, and the facts.
func (p *page) run(e *report.Evaluation) {
	p.runHead(e)
	p.blank()
	p.figures(e)
	p.blank()
	p.curve(e)
	p.why(e)
	p.arms(e)
	p.estimates(e)
	p.facts(e)
	p.origin(e)
}

func (p *page) runHead(e *report.Evaluation) {
	headline, do := "no objection", "Sound means "+report.SoundMeans+"."
	if f := e.Heaviest(); f != nil && e.Verdict != report.VerdictSound {
		w, _ := report.Words(f.Flag)
		headline, do = w.Headline, w.Do
	}
	lead, word := verdictMark(e.Verdict)+" ", string(e.Verdict)+": "
	for n, l := range wrap(word+Clean(headline), p.width-4) {
		if n == 0 {
			p.line(piece{verdictInk(e.Verdict), lead + word}, piece{strong, strings.TrimPrefix(l, word)})
			continue
		}
		p.line(piece{strong, "    " + l})
	}
	p.sentence(plain, "    ", do)
	name := Shorten(e.Facts.Sample, p.width-8)
	if name == "" {
		name = "no sample stated"
	}
	p.sentence(faint, "    ", name+"; "+runPlace(e))
}

// figures has the answers: refit, its interval, indicated, difference,
// bracket, for each endpoint.
func (p *page) figures(e *report.Evaluation) {
	pairs := e.Pairs()
	for i, pair := range pairs {
		number := ""
		if len(pairs) > 1 {
			number = " " + strconv.Itoa(i+1)
		}
		if r := pair.Refit; r != nil {
			p.labelled("refit"+number, blue, p.mark.Of(r.Volume())+" mL, "+Clean(r.Kind)+" by "+Clean(r.Estimator)+", u "+p.mark.Of(r.U())+" mL")
			p.labelled("  95 %", blue, p.mark.Of(r.Interval())+" mL; readings only, without burette and titrant")
		} else {
			p.labelled("refit"+number, blue, "no endpoint")
		}
		p.indicated(number, pair)
		if r := pair.Refit; r != nil {
			p.labelled("  bracket", plain, p.bracketSays(e, r))
		}
	}
	if len(pairs) == 0 {
		p.labelled("refit", blue, "no endpoint")
		p.labelled("indicated", plain, "none")
	}
}

func (p *page) indicated(number string, pair report.Pair) {
	in := pair.Indicated
	if in == nil {
		p.labelled("indicated"+number, plain, "none")
		return
	}
	says := p.mark.Of(in.Volume()) + " mL, " + Clean(in.Kind)
	if in.Line > 0 {
		says += ", line " + strconv.Itoa(in.Line) + " of the dump"
	}
	p.labelled("indicated"+number, plain, says)
	r := pair.Refit
	switch {
	case r == nil:
	case r.Differs != nil:
		p.labelled("  difference", blue, p.mark.Of(r.Difference())+" mL, "+p.mark.Of(r.DifferencePercent())+" % of the refit; "+p.mark.Of(r.DifferenceLimit())+" mL allowed"+p.betweenKinds(r))
	case r.Kind != in.Kind:
		p.labelled("  difference", plain, "not told: "+Clean(r.Kind)+" and "+Clean(in.Kind)+" are unlike kinds")
	}
}

// betweenKinds tells the kind that was compared where it is not the answer's.
func (p *page) betweenKinds(r *report.Endpoint) string {
	if r.Differs.Kind == r.Kind {
		return ""
	}
	return " (between " + Clean(r.Differs.Kind) + " " + p.mark.Fixed(r.Differs.RefitML, r.DifferenceDecimals()) + " mL and the indicated)"
}

// bracketSays names the two readings and where they stand in the dump.
func (p *page) bracketSays(e *report.Evaluation, r *report.Endpoint) string {
	return p.readingAt(e, r.BracketML[0]) + " to " + p.readingAt(e, r.BracketML[1])
}

func (p *page) readingAt(e *report.Evaluation, volumeML float64) string {
	says := p.mark.Fixed(volumeML, report.BracketDecimals) + " mL"
	if e.Picture == nil {
		return says
	}
	found := -1
	for i, d := range e.Picture.Dots { // the last one, or the last that was used
		if d.VolumeML == volumeML && (found < 0 || !d.LeftOut) {
			found = i
		}
	}
	if found < 0 {
		return says
	}
	d := e.Picture.Dots[found]
	return says + " (line " + strconv.Itoa(d.Line) + ", " + p.readingSays(e.Signal, d.AsRead) + ")"
}

// readingSays prints a reading with its name or unit.
func (p *page) readingSays(signal string, v float64) string {
	switch s := ingest.Signal(signal); s {
	case ingest.Potential:
		return p.mark.Fixed(v, 1) + " mV"
	case ingest.Conductivity:
		return p.mark.Short(v, 5) + " mS/cm"
	}
	return "pH " + p.mark.Fixed(v, 2)
}

// why lists the flags, heaviest first, each with its sentence and what to do.
func (p *page) why(e *report.Evaluation) {
	if len(e.Flags) == 0 {
		return
	}
	title := "Why it is " + string(e.Verdict)
	if e.Verdict == report.VerdictSound {
		title = "Worth telling"
	}
	p.title(title, "")
	for i, f := range e.Flags {
		w, _ := report.Words(f.Flag)
		mark := warm
		if f.Weight == report.Note {
			mark = faint
		}
		about := ""
		if f.Endpoint > 0 && len(e.Endpoints) > 1 {
			about = ", endpoint " + strconv.Itoa(f.Endpoint)
		}
		p.line(piece{mark, weightMark(f.Weight) + " "}, piece{strong, Shorten(f.Flag, 20)}, piece{faint, "  " + string(f.Weight) + about})
		p.sentence(plain, "    ", Clean(p.mark.Says(f.Says)))
		if lines := report.LineList(f.Lines); lines != "" {
			p.sentence(faint, "    ", "In the dump: "+lines+".")
		}
		if w.Do != "" && f.Weight != report.Note && i > 0 { // the first stands under the headline
			p.sentence(plain, "    ", "To do: "+w.Do)
		}
	}
}

func (p *page) arms(e *report.Evaluation) {
	if e.Picture == nil || len(e.Picture.Arms) == 0 {
		return
	}
	p.title("What the arms say", "fitted to the readings corrected for dilution")
	for _, a := range e.Picture.Arms {
		p.labelled(armLabel(a.Name), plain, strconv.Itoa(a.Readings)+" readings from "+p.mark.Fixed(a.FromML, 3)+" to "+p.mark.Fixed(a.ToML, 3)+
			" mL; slope "+p.mark.Short(a.Slope, 4)+" mS/cm per mL, u "+p.mark.Short(a.USlope, 2))
	}
}

// armLabel is the name of an arm before its count.
func armLabel(name string) string {
	label, _, _ := strings.Cut(name, ",")
	return label
}

func (p *page) estimates(e *report.Evaluation) {
	for i := range e.Endpoints {
		r := &e.Endpoints[i]
		if len(r.Estimates) == 0 {
			continue
		}
		note := ""
		if len(e.Endpoints) > 1 {
			note = "endpoint " + strconv.Itoa(r.N)
		}
		p.title("Estimates", note)
		if p.width >= tableWidth {
			p.line(piece{faint, "  " + pad("estimator", 18) + pad("kind", 16) + padLeft("mL", 10) + padLeft("u of the fit", 14)})
		}
		for _, one := range r.Estimates {
			p.estimate(r, one)
		}
	}
}

// tableWidth is what a row of the table of estimates needs.
const tableWidth = 72

// estimate is one row; the answer says so in words.
func (p *page) estimate(r *report.Endpoint, one report.Estimate) {
	answer, volume, u := "", p.mark.Fixed(one.VolumeML, report.VolumeDecimals(one.UFitML)), p.mark.Fixed(one.UFitML, report.UDecimals(one.UFitML))
	if one.Estimator == r.Estimator && one.Kind == r.Kind {
		answer = "the answer"
	}
	if p.width < tableWidth {
		p.labelled(one.Estimator, blue, volume+" mL, "+Clean(one.Kind)+", u of the fit "+u+" mL "+answer)
		return
	}
	p.line(piece{blue, "  " + pad(Shorten(one.Estimator, 17), 18) + report.KindMark(one.Kind, true) + " " + pad(Shorten(one.Kind, 13), 14) +
		padLeft(volume, 10) + padLeft(u, 14)}, piece{plain, "  " + answer})
}

func (p *page) facts(e *report.Evaluation) {
	f := &e.Facts
	p.title("Facts", "as the dump says")
	titrant := Clean(f.Titrant)
	if f.TitrantMolPerL != nil {
		titrant = strings.TrimSpace(titrant + " " + p.mark.Short(*f.TitrantMolPerL, 6) + " mol/L")
	}
	for _, fact := range [...][2]string{
		{"sample", f.Sample}, {"procedure", f.Procedure}, {"purpose", f.Purpose}, {"instrument", f.Instrument}, {"operator", f.Operator},
		{"started", report.Moment(f.Started)}, {"titrant", titrant}, {"aliquot", p.measured(f.AliquotML, "mL")}, {"solvent", p.measured(f.SolventML, "mL")},
		{"temperature", p.measured(f.TemperatureC, "°C")}, {"reaction", f.Reaction}, {"end reading", p.measured(f.EndReading, ingest.Signal(e.Signal).Unit())},
	} {
		p.labelled(fact[0], plain, Clean(fact[1]))
	}
	for _, other := range f.Other {
		p.labelled(other.Key, plain, Clean(other.Value))
	}
}

func (p *page) measured(v *float64, unit string) string {
	switch {
	case v == nil:
		return ""
	case unit == "pH":
		return "pH " + p.mark.Short(*v, 6)
	}
	return p.mark.Short(*v, 6) + " " + unit
}

// origin is what was read and how: the audit's part.
func (p *page) origin(e *report.Evaluation) {
	p.title("Read from", "")
	where := "run " + strconv.Itoa(e.Run)
	if e.Line > 0 {
		where += " from line " + strconv.Itoa(e.Line)
	}
	p.labelled("dump", plain, Clean(e.Dump)+", "+where+", "+strconv.Itoa(e.Readings)+" readings")
	p.labelled("also in", plain, Clean(strings.Join(e.Also, ", ")))
	p.labelled("schema", plain, Clean(e.Schema))
	p.labelled("SHA-256", faint, Clean(e.DumpSHA256))
	p.labelled("evaluation", plain, Clean(e.ID)+", revision "+strconv.Itoa(e.Revision)+", lastdrop "+Clean(e.Lastdrop))
	for i, r := range e.Repairs {
		label := ""
		if i == 0 {
			label = "repairs"
		}
		p.labelled(label, plain, Clean(r))
	}
	p.labelled("the fit", plain, p.fitSays(e))
}

// fitSays are the figures of the fit that no flag needs.
func (p *page) fitSays(e *report.Evaluation) string {
	d, said := &e.Diagnostics, []string(nil)
	if d.ReadingNoise != nil {
		said = append(said, "noise of a reading "+p.mark.Short(*d.ReadingNoise, 2)+" "+ingest.Signal(e.Signal).Unit())
	}
	if d.RelativeNoisePercent != nil {
		said = append(said, "noise of a reading "+p.mark.Short(*d.RelativeNoisePercent, 2)+" %")
	}
	switch {
	case d.ResidualSD == nil:
	case ingest.Signal(e.Signal) == ingest.Conductivity:
		said = append(said, "residuals "+p.mark.Short(*d.ResidualSD, 2)+" % of the reading (sd)")
	default:
		said = append(said, "residuals "+p.mark.Short(*d.ResidualSD, 2)+" sd (1 is what the noise explains)")
	}
	if d.LeftOut > 0 {
		said = append(said, report.Some(d.LeftOut, "reading", "readings")+" left out")
	}
	if d.V0ML != nil {
		said = append(said, "volume before titration "+p.mark.Short(*d.V0ML, 6)+" mL")
	}
	return strings.Join(said, "; ")
}
