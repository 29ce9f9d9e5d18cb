//go:build unix

package main

import (
	"io/fs"
	"syscall"
)

// umask gives the process's file mode mask.
func umask() fs.FileMode {
	m := syscall.Umask(0)
	syscall.Umask(m)
	return fs.FileMode(m)
}
