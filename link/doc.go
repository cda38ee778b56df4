// Package link computes the budget of a radio link: for each direction a list of lines, each with
// its value in dB, its kind and its source, that add up to the margin.
//
// It brings together what antenna, link/propagation and link/noise know; it takes plain values
// and a terrain profile and reads nothing.
package link
