package main

import (
	"errors"
	"fmt"
	"syscall"

	"lastdrop/cmd/internal/night"
)

// The exit codes of every command. They are part of the command line's
// interface and listed in the README.
const (
	exitDone       = 0   // done, whatever was found
	exitUnfinished = 1   // could not finish
	exitUsage      = 2   // usage or configuration
	exitFound      = 4   // done, and something that --fail-on names was found
	exitNoDump     = 6   // no dump found
	exitInUse      = 75  // another sweep is at work in the same OUT
	exitInterrupt  = 130 // stopped cleanly by SIGINT
	exitTerminate  = 143 // stopped cleanly by SIGTERM
)

// exitCode is the only place that turns an error into an exit code.
func exitCode(err error) int {
	if err == nil {
		return exitDone
	}
	if s, ok := errors.AsType[stopped](err); ok {
		if s.by == syscall.SIGTERM {
			return exitTerminate
		}
		return exitInterrupt
	}
	if e, ok := errors.AsType[*night.Error](err); ok {
		return nightCode(e.Kind)
	}
	if _, ok := errors.AsType[*usageError](err); ok {
		return exitUsage
	}
	if f, ok := errors.AsType[*faults](err); ok {
		return f.code
	}
	if _, ok := errors.AsType[*foundError](err); ok {
		return exitFound
	}
	return exitUnfinished
}

func nightCode(k night.Kind) int {
	switch k {
	case night.BadRequest:
		return exitUsage
	case night.NoDump:
		return exitNoDump
	case night.InUse:
		return exitInUse
	}
	return exitUnfinished
}

// usageError is a command line that cannot be carried out.
type usageError struct{ msg, try string }

func (e *usageError) Error() string { return e.msg }

func usage(try, form string, args ...any) error {
	return &usageError{msg: fmt.Sprintf(form, args...), try: try}
}

// failure is an error with what to do next.
type failure struct {
	err error
	try string
}

func (e *failure) Error() string { return e.err.Error() }
func (e *failure) Unwrap() error { return e.err }

// foundError says what --fail-on found. The command itself is done.
type foundError struct{ msg string }

func (e *foundError) Error() string { return e.msg }
