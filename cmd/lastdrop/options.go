package main

import (
	"fmt"
	"strings"

	"github.com/urfave/cli/v2"
)

// option is one option of a command: what the library parses and what the
// help says.
type option struct {
	flag    cli.Flag
	value   string // placeholder of its value, "" for a switch
	says    string // with the unit of a quantity
	without string // what holds without it
	example string // a value
}

func (o option) name() string { return o.flag.Names()[0] }

// command is one command of the program.
type command struct {
	name    string // "schema list" for a part of schema
	use     string // what stands behind the name
	says    string // one line
	more    string // a paragraph for its own help
	example []string
	options []option
	action  func(*cli.Context) error
	parts   []*command // its own commands; it has no action then
}

// word is the last word of the name.
func (c *command) word() string { return c.name[strings.LastIndexByte(c.name, ' ')+1:] }

// helpOption is what every command has beside its own options.
func helpOption() option {
	return option{flag: &cli.BoolFlag{Name: "help", Aliases: []string{"h"}}, says: "show this help"}
}

// find returns the option with this name.
func (c *command) find(name string) (option, bool) {
	for _, o := range append(c.options, helpOption()) {
		for _, n := range o.flag.Names() {
			if n == name {
				return o, true
			}
		}
	}
	return option{}, false
}

// hoist moves options before paths: the library takes every option behind the
// first path for one more path, in silence. "--" ends the options. Unknown
// options and missing values are usage errors. help is true when it was asked
// for: the library would print its own.
func (c *command) hoist(args []string) (hoisted []string, help bool, err error) {
	var options, paths []string
	for i := 0; i < len(args); i++ {
		a := args[i]
		if a == "--" {
			paths = append(paths, args[i+1:]...)
			break
		}
		if len(a) < 2 || a[0] != '-' {
			paths = append(paths, a)
			continue
		}
		name, _, joined := strings.Cut(strings.TrimLeft(a, "-"), "=")
		o, known := c.find(name)
		if !known {
			return nil, false, usage("lastdrop "+c.name+" --help", "%s has no option %q", c.name, a)
		}
		if o.name() == "help" {
			return nil, true, nil
		}
		options = append(options, a)
		if o.value == "" || joined {
			continue
		}
		if i++; i == len(args) || c.isOption(args[i]) {
			return nil, false, usage("lastdrop "+c.name+" --help", "option %s needs %s behind it", a, o.value)
		}
		options = append(options, args[i])
	}
	return append(append(options, "--"), paths...), false, nil
}

// isOption is true for an argument that is an option of the command, so that
// "--into --json" is a missing value, while "--seed -5" has one.
func (c *command) isOption(a string) bool {
	name, _, _ := strings.Cut(strings.TrimLeft(a, "-"), "=")
	_, known := c.find(name)
	return known && strings.HasPrefix(a, "-")
}

// helpWidth is how many columns a help text has, helpIndent where what an
// option says begins.
const helpWidth, helpIndent = 80, 24

// help is the command's own help text.
func (c *command) help() string {
	var b strings.Builder
	fmt.Fprintf(&b, "lastdrop %s: %s\n\n  lastdrop %s %s\n\n%s\n", c.name, c.says, c.name, c.use, wrap(c.more, helpWidth, 0))
	if len(c.parts) > 0 {
		b.WriteString("\n" + parts(c.parts) + "\n  lastdrop " + c.name + " COMMAND --help   options and examples of one\n")
		return b.String()
	}
	b.WriteString("\nOptions, before or behind paths; -- ends them:\n")
	for _, o := range append(c.options, helpOption()) {
		b.WriteString(o.help())
	}
	b.WriteString("\nExamples:\n")
	for _, e := range c.example {
		b.WriteString("  " + e + "\n")
	}
	return b.String()
}

func (o option) help() string {
	head := "  --" + o.name()
	if o.value != "" {
		head += " " + o.value
	}
	says := o.says
	if o.without != "" {
		says += "; without it " + o.without
	}
	if o.example != "" {
		says += ", e.g. " + o.example
	}
	text := wrap(says, helpWidth-helpIndent, helpIndent)
	if len(head) >= helpIndent-1 {
		return head + "\n" + strings.Repeat(" ", helpIndent) + text + "\n"
	}
	return head + strings.Repeat(" ", helpIndent-len(head)) + text + "\n"
}

// wrap breaks a text into lines of at most so many columns; lines after the
// first are indented.
func wrap(s string, width, indent int) string {
	var b strings.Builder
	column := 0
	for _, word := range strings.Fields(s) {
		n := len([]rune(word))
		switch {
		case column == 0:
		case column+1+n > width:
			b.WriteString("\n" + strings.Repeat(" ", indent))
			column = 0
		default:
			b.WriteByte(' ')
			column++
		}
		b.WriteString(word)
		column += n
	}
	return b.String()
}
