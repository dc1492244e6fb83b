package main

import "github.com/maxence-charriere/go-app/v9/pkg/app"

// bytesOf reads a file that the browser holds.
func bytesOf(blob app.Value) ([]byte, error) {
	buffer, err := await(blob.Call("arrayBuffer"))
	if err != nil {
		return nil, err
	}
	return bytesIn(app.Window().Get("Uint8Array").New(buffer)), nil
}

// bytesIn are the bytes of a Uint8Array.
func bytesIn(array app.Value) []byte {
	data := make([]byte, array.Length())
	app.CopyBytesToGo(data, array)
	return data
}

// arrayOf is a Uint8Array with these bytes.
func arrayOf(data []byte) app.Value {
	array := app.Window().Get("Uint8Array").New(len(data))
	app.CopyBytesToJS(array, data)
	return array
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
	return app.Window().Get("Blob").New(list(part))
}

// list is an array of the browser.
func list(values ...any) app.Value { return app.Window().Get("Array").Call("of", values...) }
