// Package friction holds the kinds of elements that turn work into heat where surfaces rub.
package friction
