package main

import (
	"errors"
	"io/fs"
	"os"
)

// cause returns an error of the system without the path and the call that it
// names: the line says the path already, as it was given.
func cause(err error) error {
	var path *fs.PathError
	if errors.As(err, &path) {
		return path.Err
	}
	var link *os.LinkError
	if errors.As(err, &link) {
		return link.Err
	}
	return err
}
