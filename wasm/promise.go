package main

import (
	"errors"

	"github.com/maxence-charriere/go-app/v9/pkg/app"
)

// await waits for a promise; not to be called from an event's handler, where
// it would keep the promise from ever being kept.
func await(promise app.Value) (app.Value, error) {
	type outcome struct {
		value app.Value
		err   error
	}
	done := make(chan outcome, 1)
	kept := app.FuncOf(func(_ app.Value, args []app.Value) any {
		done <- outcome{value: args[0]}
		return nil
	})
	broken := app.FuncOf(func(_ app.Value, args []app.Value) any {
		done <- outcome{err: errors.New(args[0].Get("message").String())}
		return nil
	})
	defer kept.Release()
	defer broken.Release()
	promise.Call("then", kept, broken)
	o := <-done
	return o.value, o.err
}
