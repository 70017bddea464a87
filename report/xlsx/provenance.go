package xlsx

import (
	"lastdrop/report"
)

func layProvenance(b *book, p *places) error {
	n := p.night
	s := b.open(layout{name: provenanceSheet, columns: []column{{width: 24}, {width: 15}, {width: 10}, {width: 70}, {width: 62}}, tab: second}, p.footer)
	s.put(0, heading("Where these figures come from"))
	s.skip(1)
	layOrigin(s, n)
	layCautions(s, n)
	s.skip(1)
	laySchemas(s, n.Schemas)
	s.skip(1)
	layLimits(s, n.Limits)
	return s.finish()
}

func heading(words string) cell { return cell{words, look{colour: ink, size: 15, bold: true}} }
func title2(words string) cell  { return cell{words, look{colour: ink, size: 11, bold: true}} }
func label(words string) cell   { return cell{words, plain().in(second)} }
func head(words string) cell {
	l := plain().in(second).wrapped()
	l.head = true
	return cell{words, l}
}
func headRight(words string) cell {
	c := head(words)
	c.look.right = true
	return c
}

func layOrigin(s *sheet, n *report.Night) {
	estimator := n.Estimator
	if estimator == "" {
		estimator = "the usual choice for each run"
	}
	days := n.Days()
	if days == "" {
		days = "no run states its start"
	}
	for _, line := range [...][2]string{
		{"program", "lastdrop " + n.Lastdrop},
		{"laboratory", n.Laboratory},
		{"published", report.Day(n.Date)},
		{"days", days},
		{"estimator asked for", estimator},
		{"numbers", "Cells keep 15 significant digits and show those that the uncertainty supports; evaluations.jsonl has every digit."},
		{"uncertainty", "u and the 95 % interval come from the readings only; burette, titrant and aliquot are not included."},
		{"dumps", "Raw dumps were read and not changed. Each run names its dump and line; evaluations.jsonl has the SHA-256 of the dump."},
	} {
		if line[1] != "" {
			s.put(0, label(line[0]), text(line[1]))
		}
	}
}

func layCautions(s *sheet, n *report.Night) {
	s.put(0, label("caution"), text(report.Caution))
	s.put(0, label("sound"), text("Sound means "+report.SoundMeans+"."))
	if n.Invented {
		s.put(0, label("data"), cell{report.InventedNote, plain().strong()})
	}
}

func laySchemas(s *sheet, schemas []report.SchemaUse) {
	s.put(0, title2("Schemas that read the dumps"))
	if len(schemas) == 0 {
		s.put(0, text("No schema read a run."))
		return
	}
	s.put(0, head("schema"), headRight("runs read"), head(""), head("SHA-256 of the schema"), head("where from"))
	for _, u := range schemas {
		s.put(0, text(u.Name), count(u.Runs), cell{}, text(u.SHA256), text(u.From))
	}
}

func layLimits(s *sheet, limits []report.Limit) {
	s.put(0, title2("Limits in force"))
	if len(limits) == 0 {
		s.put(0, text("No limit was stated."))
		return
	}
	s.put(0, head("flag"), headRight("limit"), head("unit"), head("what it means"), head("where it comes from"))
	for _, l := range limits {
		s.put(0, text(l.Flag), number(l.Value, asStated(l.Value), ink), text(l.Unit), wrapped(l.Means), wrapped(l.Source))
	}
}
