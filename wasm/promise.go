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

// bytesOf reads a file that the browser holds.
func bytesOf(blob app.Value) ([]byte, error) {
	buffer, err := await(blob.Call("arrayBuffer"))
	if err != nil {
		return nil, err
	}
	array := app.Window().Get("Uint8Array").New(buffer)
	data := make([]byte, array.Length())
	app.CopyBytesToGo(data, array)
	return data, nil
}

// copied is a copy of a file in memory, so that what is asked twice is asked of
// the same bytes, even if the file on the disk has changed meanwhile.
func copied(blob app.Value) (app.Value, error) {
	buffer, err := await(blob.Call("arrayBuffer"))
	if err != nil {
		return nil, err
	}
	return blobOf(buffer), nil
}

// blobOf makes a file in memory of one part: a buffer or a text.
func blobOf(part any) app.Value {
	return app.Window().Get("Blob").New(app.Window().Get("Array").Call("of", part))
}
