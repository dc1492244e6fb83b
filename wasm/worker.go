package main

import (
	"encoding/json"

	"github.com/maxence-charriere/go-app/v9/pkg/app"
)

// runWorker serves the page that started this worker, and never returns. A
// message is {text, name, file}: a request, and the file it is about when the
// worker doesn't hold that one yet.
func runWorker() {
	self := app.Window()
	messages := make(chan app.Value, 64)
	self.Set("onmessage", app.FuncOf(func(_ app.Value, args []app.Value) any {
		messages <- args[0].Get("data")
		return nil
	}))
	early := self.Get("tailgapEarly")
	for i := range early.Length() {
		messages <- early.Index(i).Get("data")
	}
	post := func(r reply) { self.Call("postMessage", encoded(r)) }
	b := &bench{}
	for message := range messages { // one after the other, in the order they came
		post(answered(b, message, post))
	}
}

func answered(b *bench, message app.Value, post func(reply)) reply {
	var r request
	if err := json.Unmarshal([]byte(message.Get("text").String()), &r); err != nil {
		return reply{Kind: sayBroken, Error: err.Error()}
	}
	if blob := message.Get("file"); blob.Truthy() {
		name := message.Get("name").String()
		data, err := bytesOf(blob)
		if err != nil {
			return reply{ID: r.ID, Kind: r.Kind, Error: "the file " + name + " can't be read: " + err.Error()}
		}
		b.hold(name, data)
	}
	return b.serve(r, post)
}

// encoded is the reply as text; a reply that can't be encoded says so.
func encoded(r reply) string {
	text, err := json.Marshal(r)
	if err != nil {
		text, _ = json.Marshal(reply{ID: r.ID, Kind: r.Kind, Error: err.Error()})
	}
	return string(text)
}
