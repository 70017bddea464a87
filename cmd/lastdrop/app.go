package main

import (
	"context"
	"io"
	"strings"

	"github.com/urfave/cli/v2"
)

// commands are all that the program can do.
func (p *program) commands() []*command {
	return []*command{p.sweepCommand(), p.lookCommand(), p.schemaCommand(), p.demoCommand()}
}

// execute parses the arguments with the library, with its measured traps
// shut: options behind paths are hoisted before it sees them, its own errors
// and help never reach stdout unasked, and it never exits.
func (p *program) execute(ctx context.Context, args []string) error {
	all := p.commands()
	if len(args) == 0 {
		return usage("lastdrop --help", "no command")
	}
	switch args[0] {
	case "--help", "-h", "-help", "help":
		return p.help(all, args[1:])
	case "--version", "-V":
		_, err := io.WriteString(p.stdout, "lastdrop "+version+"\n")
		return err
	}
	c, rest, err := pick(all, args)
	if err != nil {
		return err
	}
	if len(c.parts) > 0 { // it was asked for help, else pick had refused it
		return p.help(all, []string{c.name})
	}
	hoisted, help, err := c.hoist(rest)
	switch {
	case err != nil:
		return err
	case help:
		return p.help(all, strings.Fields(c.name))
	}
	words := append([]string{"lastdrop"}, strings.Fields(c.name)...)
	return p.app(all).RunContext(ctx, append(words, hoisted...))
}

// pick returns the command that the arguments begin with, and what stands
// behind it. A command of parts is returned itself only when its help was
// asked for.
func pick(all []*command, args []string) (c *command, rest []string, err error) {
	if c, err = named(all, args[0]); err != nil || len(c.parts) == 0 {
		return c, args[1:], err
	}
	if len(args) == 1 {
		return nil, nil, usage("lastdrop "+c.name+" --help", "%s needs one of %s behind it", c.name, lastWords(c.parts))
	}
	switch args[1] {
	case "--help", "-h", "-help", "help":
		return c, nil, nil
	}
	part, err := named(c.parts, args[1])
	return part, args[2:], err
}

// named returns the command with that last word.
func named(all []*command, word string) (*command, error) {
	for _, c := range all {
		if c.word() == word {
			return c, nil
		}
	}
	help, group := "lastdrop --help", ""
	if head, _, ok := strings.Cut(all[0].name, " "); ok {
		help, group = "lastdrop "+head+" --help", head+" "
	}
	if strings.HasPrefix(word, "-") {
		return nil, usage(help, "the option %q stands before the command; options stand behind it", word)
	}
	return nil, usage(help, "%q is no %scommand; there are %s", word, group, lastWords(all))
}

func lastWords(all []*command) string {
	words := make([]string, len(all))
	for i, c := range all {
		words[i] = c.word()
	}
	return strings.Join(words, ", ")
}

// help prints the help of the program or of one command.
func (p *program) help(all []*command, about []string) error {
	text := overview(all)
	if len(about) > 0 {
		c, err := named(all, about[0])
		if err == nil && len(about) > 1 && len(c.parts) > 0 {
			c, err = named(c.parts, about[1])
		}
		if err != nil {
			return err
		}
		text = c.help()
	}
	_, err := io.WriteString(p.stdout, text)
	return err
}

func overview(all []*command) string {
	var b strings.Builder
	b.WriteString("lastdrop: refits the endpoints of titrations from the raw readings\n\n")
	b.WriteString(parts(all))
	b.WriteString("\n  lastdrop COMMAND --help   options, units, defaults and examples of a command\n" +
		"  lastdrop --version        the version of the program\n")
	return b.String()
}

// parts tells each command in a line or two.
func parts(all []*command) string {
	var b strings.Builder
	for _, c := range all {
		b.WriteString("  lastdrop " + c.name + " " + c.use + "\n      " + wrap(c.says, helpWidth-6, 6) + "\n")
	}
	return b.String()
}

func (p *program) app(all []*command) *cli.App {
	app := &cli.App{
		Name: "lastdrop", Writer: p.stdout, ErrWriter: p.stderr, Reader: p.stdin,
		HideVersion: true, HideHelp: true, HideHelpCommand: true, DisableSliceFlagSeparator: true,
		ExitErrHandler: func(*cli.Context, error) {},
		OnUsageError:   misuse("lastdrop --help"),
		Action:         func(*cli.Context) error { return usage("lastdrop --help", "no command") },
	}
	app.Commands = parsed(all)
	return app
}

// parsed are the commands as the library wants them.
func parsed(all []*command) (made []*cli.Command) {
	for _, c := range all {
		one := &cli.Command{Name: c.word(), Action: c.action, HideHelp: true, HideHelpCommand: true, OnUsageError: misuse("lastdrop " + c.name + " --help")}
		for _, o := range c.options {
			one.Flags = append(one.Flags, o.flag)
		}
		one.Subcommands = parsed(c.parts)
		made = append(made, one)
	}
	return made
}

// misuse puts what the flag parser says into our words. After hoisting that
// is only a value that has not the type of its option.
func misuse(help string) cli.OnUsageErrorFunc {
	return func(_ *cli.Context, err error, _ bool) error {
		s := strings.TrimSuffix(err.Error(), ": parse error")
		s = strings.Replace(s, " for flag -", " for option --", 1)
		return usage(help, "%s", strings.Replace(s, "invalid value", "unusable value", 1))
	}
}
