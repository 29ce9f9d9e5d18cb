//go:build !(darwin || dragonfly || freebsd || linux || netbsd || openbsd)

package main

import (
	"errors"
	"io"
)

// lockFolder locks nothing here: what a killed program leaves stays.
func lockFolder(string) (io.Closer, error) { return nil, errors.ErrUnsupported }

// isMount cannot tell here.
func isMount(string) bool { return false }
