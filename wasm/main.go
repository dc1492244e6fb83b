// Command wasm is the page: a sheet that asks the question and shows the
// answer, and the worker that computes it. The same program runs as both,
// and tells by the document which of the two it is.
package main

import (
	"fmt"
	"os"

	"github.com/maxence-charriere/go-app/v9/pkg/app"
)

func main() {
	switch {
	case app.IsServer:
		fmt.Fprintln(os.Stderr, "this program is the page's; build it for js/wasm, as make page does")
		os.Exit(1)
	case app.Window().Get("document").Truthy():
		runPage()
	default:
		runWorker()
	}
}

// runPage shows the sheet, whatever the page's address, and never returns.
func runPage() {
	app.RouteWithRegexp(".*", &sheet{})
	app.RunWhenOnBrowser()
}
