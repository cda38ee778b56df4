// Package report writes results for people and for other programs: tables, JSON, CSV, GeoJSON
// and pictures. It computes nothing; every figure comes from package link.
package report
