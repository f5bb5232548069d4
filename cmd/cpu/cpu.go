// Package cpu reads the CPU time that the process has used, all threads together.
package cpu
