package schemas

import (
	"encoding/json"
	"flag"
	"fmt"
	"maps"
	"os"
	"path/filepath"
	"regexp"
	"slices"
	"strings"
	"testing"
	"time"

	"github.com/BurntSushi/toml"
)

var update = flag.Bool("update", false, "write schema.json anew")

type object = map[string]any

var (
	text     = object{"type": "string"}
	flagged  = object{"type": "boolean"}
	oneChar  = object{"type": "string", "maxLength": 1}
	texts    = object{"anyOf": []any{object{"type": "string", "minLength": 1}, object{"type": "array", "items": object{"type": "string", "minLength": 1}}}}
	anyTexts = object{"anyOf": []any{text, object{"type": "array", "items": text}}}
	means    = object{"type": "object", "additionalProperties": text}
)

func oneOf(words ...string) object {
	list := []any{}
	for _, w := range words {
		list = append(list, w)
	}
	return object{"enum": list}
}

// keyForms has the form of every key, by section as keysAsked has them. Closed
// sets come from the tables of the parser.
func keyForms() map[string]object {
	var roles, names, unitCodes []string
	for _, f := range fieldForms {
		roles = append(roles, string(f.role))
	}
	for _, f := range factForms {
		names = append(names, string(f.name))
	}
	for _, u := range units {
		unitCodes = append(unitCodes, u.Code)
	}
	lines := oneOf(string(CommentLines), string(CellLines), string(TextLines))
	return map[string]object{
		"": {"name": object{"type": "string", "pattern": "^[a-z0-9-]+$"}, "title": text, "valid_from": object{"type": "string", "pattern": "^[0-9]{4}-[0-9]{2}-[0-9]{2}$"},
			"layout":     oneOf(string(Single), string(Stacked), string(Long), string(Wide)),
			"sameVolume": oneOf("all", string(SameLast)), "repeatedHeader": flagged, "keepUnterminatedRow": flagged},
		"dialect": {"encoding": oneOf(string(UTF8), string(UTF16), string(UTF16LE), string(UTF16BE), string(Windows1252), string(Latin1), string(Auto)),
			"delimiter": object{"type": "string", "minLength": 1, "maxLength": 1}, "quoteChar": oneChar, "escapeChar": oneChar, "commentChar": oneChar, "decimalChar": oneOf(".", ","), "groupChar": oneChar,
			"headerRows": object{"type": "array", "items": object{"type": "integer", "minimum": 1, "maximum": maxHeaderRows}}, "headerJoin": text, "missingValues": anyTexts},
		"recognise": {"firstLine": text, "firstLineBegins": text, "lines": texts, "absent": texts, "header": flagged},
		"preamble":  {"lines": lines, "separator": oneChar},
		"stack":     {"begin": text, "end": text, "blank": flagged},
		"wide":      {"titles": texts},
		"footer": {"begin": text, "blank": flagged, "row": text, "titles": texts,
			"lines": oneOf(string(CommentLines), string(CellLines), string(TextLines), string(UnusedLines))},
		"fields": {"name": oneOf(roles...), "titles": texts, "unit": oneOf(unitCodes...), "suffixes": texts, "bounds": flagged, "empty": oneOf(string(EmptySame), string(EmptySkip)),
			"refills": flagged, "format": text, "shared": flagged, "values": object{"type": "object", "additionalProperties": oneOf(statusWords()...)}},
		"facts": {"name": oneOf(names...), "titles": texts, "columns": texts, "file": text, "folder": text, "default": object{"anyOf": []any{text, object{"type": "number"}}},
			"unit": oneOf(unitCodes...), "suffixes": texts, "bounds": flagged, "format": text, "zone": text, "values": means},
		"indicated": {"titles": texts, "unit": oneOf(codes(Volume)...), "suffixes": texts, "bounds": flagged, "kind": oneOf(Kinds()...), "kindTitles": texts,
			"kindValues": object{"type": "object", "additionalProperties": oneOf(Kinds()...)}},
		"results": {"titles": texts, "unit": object{"type": "string", "minLength": 1}, "suffixes": texts, "bounds": flagged},
	}
}

// needs are the keys that a table must have.
var needs = map[string][]string{"": {"name", "layout", "recognise", "fields"}, "fields": {"name", "titles"}, "facts": {"name"}, "indicated": {"titles", "unit"}, "results": {"titles", "unit"}}

// editorSchema is schema.json as the tables of the parser have it.
func editorSchema() object {
	forms := keyForms()
	root := object{}
	maps.Copy(root, forms[""])
	for section, keys := range forms {
		if section == "" {
			continue
		}
		table := object{"type": "object", "properties": keys, "additionalProperties": false}
		if n := needs[section]; n != nil {
			table["required"] = n
		}
		if slices.Contains([]string{"fields", "facts", "indicated", "results"}, section) {
			table = object{"type": "array", "items": table}
		}
		root[section] = table
	}
	return object{"$schema": "https://json-schema.org/draft/2020-12/schema", "title": "lastdrop schema of an instrument's dumps",
		"description": "language.md says what each key means; lastdrop itself checks more than this file can say.",
		"type":        "object", "properties": root, "required": needs[""], "additionalProperties": false}
}

// schema.json is what the tables of the parser say, and has every key that the
// parser asks for.
func TestEditorSchemaIsTheParsers(t *testing.T) {
	for section, want := range keysAsked(t) {
		forms := keyForms()
		got := slices.Collect(maps.Keys(forms[section]))
		switch section {
		case "The file":
			got = append(slices.Collect(maps.Keys(forms[""])), slices.DeleteFunc(slices.Collect(maps.Keys(forms)), func(s string) bool { return s == "" })...)
		case "stack, wide and footer":
			for _, s := range []string{"stack", "wide", "footer"} {
				for k := range forms[s] {
					got = append(got, s+"."+k)
				}
			}
		}
		slices.Sort(got)
		slices.Sort(want)
		if !slices.Equal(got, want) {
			t.Errorf("%s: schema.json has %v, the parser %v", section, got, want)
		}
	}
	text, err := json.MarshalIndent(editorSchema(), "", "\t")
	if err != nil {
		t.Fatal(err)
	}
	text = append(text, '\n')
	if *update {
		if err := os.WriteFile("schema.json", text, 0o644); err != nil {
			t.Fatal(err)
		}
	}
	if got, err := os.ReadFile("schema.json"); err != nil || string(got) != string(text) {
		t.Errorf("schema.json differs from the tables of the parser (%v); go test ./schemas -update", err)
	}
}

// Every shipped schema is valid by schema.json, as an editor would see it.
func TestShippedAreValidForEditors(t *testing.T) {
	schema := readEditorSchema(t)
	files, _ := filepath.Glob("*.toml")
	if len(files) < 4 {
		t.Fatalf("%d schemas", len(files))
	}
	for _, f := range files {
		src, err := os.ReadFile(f)
		if err != nil {
			t.Fatal(err)
		}
		if faults := validate(schema, decoded(t, string(src)), "$"); len(faults) > 0 {
			t.Errorf("%s: %v", f, faults)
		}
	}
}

// And what the parser refuses for its form, schema.json refuses too.
func TestEditorSchemaRefuses(t *testing.T) {
	schema := readEditorSchema(t)
	if faults := validate(schema, decoded(t, good), "$"); len(faults) > 0 {
		t.Fatalf("the good schema: %v", faults)
	}
	for _, c := range []struct{ old, new, want string }{
		{`title = "Mine"`, `titel = "Mine"`, "$.titel: not allowed"},
		{`title = "Mine"`, `title = 7`, "$.title: not a string"},
		{`layout = "single"`, `layout = "tall"`, "$.layout: not one of the set"},
		{`name = "mine"`, `name = "Mine!"`, "$.name: not of the form ^[a-z0-9-]+$"},
		{`delimiter = ";"`, `delimiter = ";;"`, "$.dialect.delimiter: too long"},
		{`delimiter = ";"`, `delimiter = ""`, "$.dialect.delimiter: too short"},
		{`titles = "pH"`, `unit = "[pH]"`, "$.fields[1].titles: missing"},
		{`titles = "pH"`, `titles = 3`, "$.fields[1].titles: none of the forms"},
		{`commentChar = "#"`, `headerRows = [0]`, "$.dialect.headerRows[0]: out of range"},
	} {
		got := fmt.Sprint(validate(schema, decoded(t, change(t, c.old, c.new)), "$"))
		if got != "["+c.want+"]" {
			t.Errorf("%s: %s, want [%s]", c.new, got, c.want)
		}
	}
}

func readEditorSchema(t *testing.T) object {
	t.Helper()
	src, err := os.ReadFile("schema.json")
	if err != nil {
		t.Fatal(err)
	}
	var schema object
	if err := json.Unmarshal(src, &schema); err != nil {
		t.Fatal(err)
	}
	return schema
}

// decoded is a TOML text as the values of JSON; a date is its text there.
func decoded(t *testing.T, src string) any {
	t.Helper()
	table := object{}
	if _, err := toml.Decode(src, &table); err != nil {
		t.Fatal(err)
	}
	for k, v := range table {
		if day, ok := v.(time.Time); ok {
			table[k] = day.Format(time.DateOnly)
		}
	}
	text, err := json.Marshal(table)
	if err != nil {
		t.Fatal(err)
	}
	var value any
	if err := json.Unmarshal(text, &value); err != nil {
		t.Fatal(err)
	}
	return value
}

// validate is as much of JSON Schema 2020-12 as schema.json uses; it fails on
// any other keyword, so that the file cannot say what nobody checks.
func validate(schema object, v any, path string) (faults []string) {
	fault := func(text string) { faults = append(faults, path+": "+text) }
	for _, keyword := range slices.Sorted(maps.Keys(schema)) {
		rule := schema[keyword]
		switch keyword {
		case "$schema", "title", "description":
		case "type":
			if !ofType(v, rule.(string)) {
				fault("not a " + rule.(string))
				return faults
			}
		case "enum":
			if !slices.Contains(rule.([]any), v) {
				fault("not one of the set")
			}
		case "anyOf":
			if !slices.ContainsFunc(rule.([]any), func(one any) bool { return validate(one.(object), v, path) == nil }) {
				fault("none of the forms")
			}
		case "minLength":
			if s, ok := v.(string); ok && float64(len([]rune(s))) < rule.(float64) {
				fault("too short")
			}
		case "maxLength":
			if s, ok := v.(string); ok && float64(len([]rune(s))) > rule.(float64) {
				fault("too long")
			}
		case "minimum", "maximum":
			if n, ok := v.(float64); ok && (keyword == "minimum" && n < rule.(float64) || keyword == "maximum" && n > rule.(float64)) {
				fault("out of range")
			}
		case "pattern":
			if s, ok := v.(string); ok && !regexp.MustCompile(rule.(string)).MatchString(s) {
				fault("not of the form " + rule.(string))
			}
		case "items":
			list, _ := v.([]any)
			for i, one := range list {
				faults = append(faults, validate(rule.(object), one, fmt.Sprintf("%s[%d]", path, i))...)
			}
		case "required":
			for _, key := range rule.([]any) {
				if table, ok := v.(object); ok && table[key.(string)] == nil {
					faults = append(faults, path+"."+key.(string)+": missing")
				}
			}
		case "properties", "additionalProperties":
		default:
			fault("unknown keyword " + keyword)
		}
	}
	return append(faults, validateKeys(schema, v, path)...)
}

// validateKeys checks the values of a table.
func validateKeys(schema object, v any, path string) (faults []string) {
	table, ok := v.(object)
	if !ok {
		return nil
	}
	properties, _ := schema["properties"].(object)
	for _, key := range slices.Sorted(maps.Keys(table)) {
		rule, known := properties[key].(object)
		if !known {
			if rule, known = schema["additionalProperties"].(object); !known {
				if schema["additionalProperties"] == false {
					faults = append(faults, path+"."+key+": not allowed")
				}
				continue
			}
		}
		faults = append(faults, validate(rule, table[key], path+"."+key)...)
	}
	return faults
}

func ofType(v any, kind string) bool {
	switch v := v.(type) {
	case string:
		return kind == "string"
	case bool:
		return kind == "boolean"
	case float64:
		return kind == "number" || kind == "integer" && v == float64(int64(v))
	case []any:
		return kind == "array"
	case object:
		return kind == "object"
	}
	return strings.Contains(kind, "null")
}
