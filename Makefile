# What one does with the project. "make test" runs everything that must pass.

GO       ?= go
FUZZTIME ?= 60s
WASM     := GOOS=js GOARCH=wasm
SUDO     := $(shell [ "$$(id -u)" = 0 ] || echo sudo)
INSTALL  := $(SUDO) apt-get update && $(SUDO) apt-get install -y

.PHONY: build page demo test tools lint wasm-test bench compare calibrate fuzz fmt reference clean
.DEFAULT_GOAL := build

## build: bin/tailgap, with the page in it, and dist/tailgap.html
build: page
	@mkdir -p bin
	cp dist/tailgap.html web/built/tailgap.html
	$(GO) build -trimpath -ldflags='-s -w' -o bin/tailgap ./cli

## page: dist/tailgap.html, one file that works with the network off
page:
	@mkdir -p dist
	$(WASM) $(GO) build -trimpath -ldflags='-s -w' -o dist/tailgap.wasm ./wasm
	$(GO) run ./web/assemble -wasm dist/tailgap.wasm -out dist/tailgap.html

## demo: build, then judge the made-up demo; its verdicts (status 3 and 4) are no error here
demo: build
	@bin/tailgap judge --demo || [ $$? -eq 3 ] || [ $$? -eq 4 ]
	@echo
	@echo "The same as a page, to open in a browser: file://$(CURDIR)/dist/tailgap.html"

## test: everything; fetches what it needs, Chromium and node included. One
## package at a time: the browser's page and the resampler want all cores
test: tools lint build
	$(GO) test -count=1 -p 1 ./...
	$(MAKE) wasm-test

# node and Go both have to be found by what runs the tests in WebAssembly.
wasm-test:
	PATH="$$PATH:$$($(GO) env GOROOT)/lib/wasm" $(WASM) $(GO) test ./core/...

## tools: install the browser and node that the tests drive, where they are missing
tools:
	@$(GO) mod download
	@[ -n "$$TAILGAP_CHROMIUM" ] || command -v chromium >/dev/null || { $(INSTALL) chromium; } || true
	@command -v node >/dev/null || { $(INSTALL) nodejs; } || true
	@[ -n "$$TAILGAP_CHROMIUM" ] || command -v chromium >/dev/null || { \
		echo "make test needs Chromium: install it, or name it in TAILGAP_CHROMIUM" >&2; exit 1; }
	@command -v node >/dev/null || { echo "make test needs node: install it" >&2; exit 1; }

## lint: gofmt, go vet and staticcheck, natively and for the page
lint:
	@unformatted="$$(gofmt -l .)"; [ -z "$$unformatted" ] || { \
		echo "not as gofmt writes it (make fmt): $$unformatted" >&2; exit 1; }
	$(GO) vet ./...
	$(WASM) $(GO) vet ./wasm/... ./core/...
	$(GO) tool staticcheck ./...
	staticcheck="$$($(GO) tool -n staticcheck)" && $(WASM) "$$staticcheck" ./wasm/...

fmt:
	gofmt -w .

## bench: how long the work takes, in the core and as a whole process
bench: build
	$(GO) test -run '^$$' -bench . -benchmem ./core/... ./cli

## fuzz: FUZZTIME for each fuzz test there is
fuzz:
	@set -e; grep -rl --include='*_test.go' '^func Fuzz' core cli | while read -r file; do \
		for name in $$(sed -n 's/^func \(Fuzz[A-Za-z0-9_]*\)(.*/\1/p' "$$file"); do \
			echo "$$(dirname "$$file"): $$name"; \
			$(GO) test -run '^$$' -fuzz "^$$name\$$" -fuzztime $(FUZZTIME) "./$$(dirname "$$file")"; \
		done; \
	done

## compare: time tailgap beside R's boot and SciPy, and as WebAssembly; needs R with boot, and SciPy
compare:
	cd testdata/bench && "$${PYTHON:-/usr/bin/python3}" run.py

## calibrate: simulate how often intervals, bands and verdicts are right, into testdata/calibration; most of an hour
calibrate:
	$(GO) run ./cli/calibrate -out testdata/calibration

## reference: recompute the published check values in testdata; needs R and Python
reference:
	cd testdata && sh generate/reference.sh

clean:
	rm -rf bin dist web/built/tailgap.html
