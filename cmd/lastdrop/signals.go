package main

import (
	"context"
	"os"
	"os/signal"
	"syscall"
)

// stopped is why a context ended: a signal.
type stopped struct{ by os.Signal }

func (s stopped) Error() string { return "stopped by the signal " + s.by.String() }

// untilSignal returns a context that the first SIGINT or SIGTERM ends. The
// second one ends the process at once.
func untilSignal(parent context.Context) context.Context {
	ctx, cancel := context.WithCancelCause(parent)
	signals := make(chan os.Signal, 1)
	signal.Notify(signals, os.Interrupt, syscall.SIGTERM)
	go func() {
		cancel(stopped{<-signals})
		signal.Stop(signals)
	}()
	return ctx
}
