//go:build !unix

package main

import "io/fs"

// umask is 0 where the system has none.
func umask() fs.FileMode { return 0 }
