//go:build !unix

package cpu

import "time"

var start = time.Now()

// Seconds returns the wall-clock time since the start of the process, where the system gives no other.
func Seconds() float64 { return time.Since(start).Seconds() }
