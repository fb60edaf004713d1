module emendary/lexicon/bench

go 1.26.0

replace emendary => ../..

require (
	emendary v0.0.0
	github.com/agnivade/levenshtein v1.2.2
	github.com/blevesearch/vellum v1.2.1
	github.com/hbollon/go-edlib v1.7.0
	github.com/rivo/uniseg v0.4.7
	github.com/stretchr/testify v1.12.1
)

require (
	github.com/bits-and-blooms/bitset v1.24.2 // indirect
	github.com/blevesearch/mmap-go v1.2.0 // indirect
	github.com/yuin/goldmark v1.8.7 // indirect
	go.yaml.in/yaml/v3 v3.0.5 // indirect
	golang.org/x/sys v0.49.0 // indirect
	golang.org/x/text v0.44.0 // indirect
)
