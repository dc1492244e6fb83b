package main

import (
	"errors"

	"github.com/maxence-charriere/go-app/v9/pkg/app"

	"tailgap/core/ask"
	"tailgap/core/words"
)

// pastedName is what pasted scores are called, as a file would be.
const pastedName = "the pasted text"

// listenForFiles makes the whole page a place to drop a file or paste scores.
func (s *sheet) listenForFiles() {
	app.Window().AddEventListener("dragover", func(_ app.Context, e app.Event) {
		e.PreventDefault() // or the browser would leave the page for the file
	})
	app.Window().AddEventListener("drop", func(_ app.Context, e app.Event) {
		e.PreventDefault()
		carried := e.Get("dataTransfer")
		if files := carried.Get("files"); files.Get("length").Int() > 0 {
			s.settle(func() { s.take(files.Index(0)) })
		} else {
			s.settle(func() { s.takeText(carried.Call("getData", "text/plain").String()) })
		}
	})
	app.Window().AddEventListener("paste", func(_ app.Context, e app.Event) {
		if e.Get("target").Call("closest", "input, textarea").Truthy() {
			return // the field has it
		}
		e.PreventDefault()
		s.settle(func() { s.takePaste(e) })
	})
}

// takePaste opens what the clipboard has: files, or text.
func (s *sheet) takePaste(e app.Event) {
	carried := e.Get("clipboardData")
	if files := carried.Get("files"); files.Get("length").Int() > 0 {
		s.take(files.Index(0))
		return
	}
	s.takeText(carried.Call("getData", "text/plain").String())
}

// take opens a file that the browser holds.
func (s *sheet) take(blob app.Value) {
	name := blob.Get("name").String()
	s.show(atData)
	s.desk.open(name, func(fetched func(*file, error)) {
		go func() {
			copied, err := copied(blob)
			if err != nil {
				err = errors.New("the file " + words.Name(name) + " can't be read: " + err.Error())
			}
			s.desk.soon(func() { fetched(&file{name: name, blob: copied}, err) })
		}()
	})
}

// takeText opens pasted text as a file would be opened.
func (s *sheet) takeText(text string) {
	if text == "" {
		return
	}
	s.show(atData)
	s.desk.open(pastedName, func(fetched func(*file, error)) {
		fetched(&file{name: pastedName, blob: blobOf(text)}, nil)
	})
}

// takeQuestion opens a question file and asks it of the data on the desk.
func (s *sheet) takeQuestion(blob app.Value) {
	go func() {
		text, err := bytesOf(blob)
		s.desk.soon(func() {
			var q ask.Question
			if err == nil {
				q, err = ask.ReadQuestion(text)
			}
			if err != nil {
				s.desk.trouble[atAway] = sentence(err)
				return
			}
			s.forget() // it was an editor of the question before
			s.desk.openQuestion(q)
		})
	}()
}
