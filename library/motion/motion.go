// Package motion holds the kinds of bodies that move and take part in the energy of motion.
package motion
