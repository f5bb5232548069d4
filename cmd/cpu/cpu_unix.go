//go:build unix

package cpu

import "syscall"

// Seconds returns the CPU time used by the process so far, in user and system mode.
func Seconds() float64 {
	var u syscall.Rusage
	if syscall.Getrusage(syscall.RUSAGE_SELF, &u) != nil {
		return 0
	}
	return seconds(u.Utime) + seconds(u.Stime)
}

func seconds(t syscall.Timeval) float64 { return float64(t.Sec) + 1e-6*float64(t.Usec) }
