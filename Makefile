# Fellreach. `make demo` and `make test` do everything on a fresh Debian 12 machine with Go, gcc,
# Node and make; `make help` lists the rest.

BIN  := .build/fellreach
# Packages that build and test without C.
PURE := ./antenna/... ./terrain ./terrain/island ./link ./link/propagation ./link/noise
GO   := go
# Seconds for each fuzz target of `make fuzz`.
FUZZTIME ?= 20s

.PHONY: help build demo test quick bench fuzz generate install format vet gotest race pure

help: ## list the targets
	@sed -n 's/^\([a-z]*\):.*## \(.*\)/  \1\t\2/p' $(MAKEFILE_LIST) | expand -t 14

install: ## install the system packages that are missing
	@sh .ci/install

build: install ## build the program into .build/
	$(GO) build -o $(BIN) ./cmd/fellreach

demo: build ## run the main job on the invented island, into .build/demo
	@rm -rf .build/demo
	$(BIN) demo .build/demo

test: install format vet gotest race pure ## run every check of the project

quick: ## Go tests alone, no installation, no network
	$(GO) test -short ./...

format:
	@out=$$($(GO) tool gofumpt -l cmd link terrain antenna web); test -z "$$out" || { echo "not formatted by gofumpt:"; echo "$$out"; exit 1; }

vet:
	$(GO) vet ./...
	$(GO) tool staticcheck ./...

gotest:
	$(GO) test ./...

race:
	$(GO) test -race -short ./...

pure:
	CGO_ENABLED=0 $(GO) test -short $(PURE)

bench: ## measure: times are ratios within one run
	$(GO) test -run '^$$' -bench . -benchmem ./...

fuzz: ## run each fuzz target for FUZZTIME
	@for pkg in $$($(GO) list ./...); do \
	  for target in $$($(GO) test -list '^Fuzz' $$pkg | grep '^Fuzz'); do \
	    echo "$$pkg $$target"; $(GO) test -run '^$$' -fuzz "^$$target$$" -fuzztime $(FUZZTIME) $$pkg || exit 1; \
	  done; done

generate: ## write the generated files and golden files anew
	$(GO) test ./cmd/fellreach ./link/report ./web -update
