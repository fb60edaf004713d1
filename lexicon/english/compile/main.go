// Compile makes the compiled form of a file of costs, which a program embeds.
package main

import (
	"flag"
	"fmt"
	"os"

	"emendary/align"
)

func main() {
	in := flag.String("in", "english.costs", "file of costs, as fit writes it")
	out := flag.String("out", "costs.compiled", "file to write")
	flag.Parse()
	if err := compile(*in, *out); err != nil {
		fmt.Fprintln(os.Stderr, "compile:", err)
		os.Exit(1)
	}
}

func compile(in, out string) error {
	f, err := os.Open(in)
	if err != nil {
		return err
	}
	defer f.Close()
	costs, err := align.ReadCosts(f, in)
	if err != nil {
		return err
	}
	data, err := costs.AppendBinary(nil)
	if err != nil {
		return err
	}
	return os.WriteFile(out, data, 0o644)
}
