# Fellreach. `make demo` and `make test` do everything on a fresh Debian 12 machine with Go, gcc,
# Node and make; `make help` lists the rest.

BIN  := .build/fellreach
# Packages that build and test without C.
PURE := ./antenna/... ./terrain ./terrain/island ./link ./link/propagation ./link/noise
GO   := go
PAGE := web/app
# Seconds for each fuzz target of `make fuzz`.
FUZZTIME ?= 20s

.PHONY: help build app demo test quick bench fuzz generate install testinstall format vet gotest race pure page browser

help: ## list the targets
	@sed -n 's/^\([a-z]*\):.*## \(.*\)/  \1\t\2/p' $(MAKEFILE_LIST) | expand -t 14

install: ## install the system packages that are missing
	@sh .ci/install

build: install app ## build the page and the program into .build/
	$(GO) build -o $(BIN) ./cmd/fellreach

app: $(PAGE)/node_modules ## build the page (Node 20.19 or newer)
	cd $(PAGE) && npm run --silent build

$(PAGE)/node_modules: $(PAGE)/package-lock.json
	cd $(PAGE) && npm ci --no-audit --no-fund
	@touch $@

demo: build ## run the main job on the invented island, into .build/demo
	@rm -rf .build/demo
	$(BIN) demo .build/demo

test: testinstall format vet build gotest race pure page browser ## run every check of the project

quick: ## Go tests alone, no installation, no network
	$(GO) test -short ./...

testinstall:
	@sh .ci/install chromium-headless-shell

format:
	@out=$$($(GO) tool gofumpt -l cmd link terrain antenna web/*.go); test -z "$$out" || { echo "not formatted by gofumpt:"; echo "$$out"; exit 1; }

vet:
	$(GO) vet ./...
	$(GO) tool staticcheck ./...

gotest:
	$(GO) test ./...

race:
	$(GO) test -race -short ./...

pure:
	CGO_ENABLED=0 $(GO) test -short $(PURE)

page: $(PAGE)/node_modules ## check the page: API types, lint, types, units
	@mkdir -p .build
	@cd $(PAGE) && npx openapi-typescript ../openapi.yaml -o ../../.build/api_schema.ts >/dev/null && \
	  diff -q src/api_schema.ts ../../.build/api_schema.ts || { echo "the page's API types are not those of openapi.yaml: run make generate"; exit 1; }
	cd $(PAGE) && npm run --silent lint && npm run --silent types && npm test --silent

browser: build ## drive the page in a real browser
	cd $(PAGE) && npm run --silent test:browser

bench: ## measure: times are ratios within one run
	$(GO) test -run '^$$' -bench . -benchmem ./...

fuzz: ## run each fuzz target for FUZZTIME
	@for pkg in $$($(GO) list ./...); do \
	  for target in $$($(GO) test -list '^Fuzz' $$pkg | grep '^Fuzz'); do \
	    echo "$$pkg $$target"; $(GO) test -run '^$$' -fuzz "^$$target$$" -fuzztime $(FUZZTIME) $$pkg || exit 1; \
	  done; done

generate: $(PAGE)/node_modules ## write the generated files and golden files anew
	$(GO) test ./cmd/fellreach ./link/report ./web -update
	cd $(PAGE) && npm run --silent api
