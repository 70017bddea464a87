package xlsx

import (
	"archive/zip"
	"bytes"
	"io"
	"testing"

	"github.com/xuri/excelize/v2"

	"lastdrop/report"
)

// written is a workbook as a reader finds it.
type written struct {
	*testing.T
	bytes []byte
	file  *excelize.File
}

func write(t *testing.T, n *report.Night) written {
	t.Helper()
	return writeWith(t, n, Options{})
}

func writeWith(t *testing.T, n *report.Night, o Options) written {
	t.Helper()
	var b bytes.Buffer
	if err := Write(&b, n, o); err != nil {
		t.Fatal(err)
	}
	f, err := excelize.OpenReader(bytes.NewReader(b.Bytes()), excelize.Options{RawCellValue: true})
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { f.Close() })
	return written{t, b.Bytes(), f}
}

func (w written) cell(sheet, name string) string {
	w.Helper()
	v, err := w.file.GetCellValue(sheet, name)
	if err != nil {
		w.Fatal(err)
	}
	return v
}

func (w written) style(sheet, name string) *excelize.Style {
	w.Helper()
	id, err := w.file.GetCellStyle(sheet, name)
	if err != nil {
		w.Fatal(err)
	}
	s, err := w.file.GetStyle(id)
	if err != nil {
		w.Fatal(err)
	}
	return s
}

// table is a sheet by the words of its head: one map a row below it.
func (w written) table(sheet string) (rows []map[string]string) {
	w.Helper()
	all, err := w.file.GetRows(sheet)
	if err != nil {
		w.Fatal(err)
	}
	for _, row := range all[1:] {
		byHead := map[string]string{}
		for i, v := range row {
			byHead[all[0][i]] = v
		}
		rows = append(rows, byHead)
	}
	return rows
}

// parts are the files in the zip, in its order.
func (w written) parts() (names []string, content map[string]string) {
	w.Helper()
	z, err := zip.NewReader(bytes.NewReader(w.bytes), int64(len(w.bytes)))
	if err != nil {
		w.Fatal(err)
	}
	content = map[string]string{}
	for _, p := range z.File {
		r, err := p.Open()
		if err != nil {
			w.Fatal(err)
		}
		b, err := io.ReadAll(r)
		if err != nil {
			w.Fatal(err)
		}
		names, content[p.Name] = append(names, p.Name), string(b)
		if got := p.Modified.UTC().Format("2006-01-02"); got != "1980-01-01" {
			w.Errorf("%s is of %s, want 1980-01-01", p.Name, got)
		}
	}
	return names, content
}
