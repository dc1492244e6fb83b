package main

import (
	"strings"

	"github.com/maxence-charriere/go-app/v9/pkg/app"
)

// byID is the element with an id; not truthy where there is none.
func byID(id string) app.Value { return app.Window().GetElementByID(id) }

// focusOn moves the focus to the first of the ids that is on the page, once
// what has just changed is shown. It is the sheet that waits for that: the
// element an event came from may be gone by then.
func (s *sheet) focusOn(ids ...string) {
	s.page.Defer(func(app.Context) {
		for _, id := range ids {
			if element := byID(id); element.Truthy() {
				element.Call("focus")
				return
			}
		}
	})
}

// focusInside moves the focus to what is written first in an element, or chosen, once it is
// shown.
func (s *sheet) focusInside(id string) {
	s.page.Defer(func(app.Context) {
		editor := byID(id)
		if !editor.Truthy() {
			return
		}
		for _, wanted := range []string{"input:not([type])", "input:not([hidden]), select, textarea, button"} {
			if field := editor.Call("querySelector", wanted); field.Truthy() {
				field.Call("focus")
				return
			}
		}
	})
}

// widthOf is how wide an element is, in px; 0 when it is not on the page.
func widthOf(id string) int {
	element := byID(id)
	if !element.Truthy() {
		return 0
	}
	return element.Get("clientWidth").Int()
}

// save hands a text to the person as a file.
func save(name, kind string, text []byte) {
	array := arrayOf(text)
	blob := app.Window().Get("Blob").New(list(array), map[string]any{"type": kind})
	address := app.Window().Get("URL").Call("createObjectURL", blob)
	link := app.Window().Get("document").Call("createElement", "a")
	link.Set("href", address)
	link.Set("download", name)
	link.Call("click")
	// The browser has begun to read the file by the time a minute is over.
	free := app.FuncOf(func(app.Value, []app.Value) any {
		app.Window().Get("URL").Call("revokeObjectURL", address)
		return nil
	})
	app.Window().Call("setTimeout", free, 60_000)
}

// typed is what stands in the field that an event is about.
func typed(ctx app.Context) string { return strings.TrimSpace(ctx.JSSrc().Get("value").String()) }

// valueOf is what stands in the field with an id; "" when it isn't shown.
func valueOf(id string) string {
	field := byID(id)
	if !field.Truthy() {
		return ""
	}
	return strings.TrimSpace(field.Get("value").String())
}
