package main

import (
	"context"
	"io"
	"strings"

	"github.com/urfave/cli/v2"
)

// commands are all that the program can do.
func (p *program) commands() []*command {
	return []*command{p.sweepCommand(), p.lookCommand(), p.demoCommand()}
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
	for _, c := range all {
		if c.name != args[0] {
			continue
		}
		hoisted, help, err := c.hoist(args[1:])
		switch {
		case err != nil:
			return err
		case help:
			return p.help(all, []string{c.name})
		}
		return p.app(all).RunContext(ctx, append([]string{"lastdrop", c.name}, hoisted...))
	}
	return notACommand(all, args[0])
}

func notACommand(all []*command, name string) error {
	if strings.HasPrefix(name, "-") {
		return usage("lastdrop --help", "the option %q stands before the command; options stand behind it", name)
	}
	names := make([]string, len(all))
	for i, c := range all {
		names[i] = c.name
	}
	return usage("lastdrop --help", "%q is no command; there are %s", name, strings.Join(names, ", "))
}

// help prints the help of the program or of one command.
func (p *program) help(all []*command, about []string) error {
	text := overview(all)
	if len(about) > 0 {
		text = ""
		for _, c := range all {
			if c.name == about[0] {
				text = c.help()
			}
		}
		if text == "" {
			return notACommand(all, about[0])
		}
	}
	_, err := io.WriteString(p.stdout, text)
	return err
}

func overview(all []*command) string {
	var b strings.Builder
	b.WriteString("lastdrop: refits the endpoints of titrations from the raw readings\n\n")
	for _, c := range all {
		b.WriteString("  lastdrop " + c.name + " " + c.use + "\n      " + wrap(c.says, helpWidth-6, 6) + "\n")
	}
	b.WriteString("\n  lastdrop COMMAND --help   options, units, defaults and examples of a command\n" +
		"  lastdrop --version        the version of the program\n")
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
	for _, c := range all {
		made := &cli.Command{Name: c.name, Action: c.action, HideHelp: true, HideHelpCommand: true, OnUsageError: misuse("lastdrop " + c.name + " --help")}
		for _, o := range c.options {
			made.Flags = append(made.Flags, o.flag)
		}
		app.Commands = append(app.Commands, made)
	}
	return app
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
