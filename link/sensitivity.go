package link

import (
	"slices"

	"fellreach/terrain"
)

// Sensitivity is what small changes do to a link, by computing it again: for FromMastDB and
// ToMastDB, the change of its margin in dB with one more metre of mast and feeder at that end;
// RasterDB, the change when the ground between the ends lies rasterErrorM higher; ChancePct, the
// change of its chance, in percent points, with one decibel more.
type Sensitivity struct{ FromMastDB, ToMastDB, RasterDB, ChancePct float64 }

// rasterErrorM is a usual error of an open elevation raster. Common practice, no source.
const rasterErrorM = 4

func sensitivity(r *Result, l *Link, p terrain.Profile, c Conditions) (Sensitivity, error) {
	change := func(l *Link, p terrain.Profile) (float64, error) {
		other, err := compute(l, p, c)
		if err != nil {
			return 0, err
		}
		return other.MarginDB - r.MarginDB, nil
	}
	var s Sensitivity
	var err error
	higher := *l
	higher.From = l.From.taller(1)
	if s.FromMastDB, err = change(&higher, p); err != nil {
		return s, err
	}
	higher.From, higher.To = l.From, l.To.taller(1)
	if s.ToMastDB, err = change(&higher, p); err != nil {
		return s, err
	}
	raised := p
	raised.AslM = slices.Clone(p.AslM)
	for i := 1; i < len(raised.AslM)-1; i++ {
		raised.AslM[i] += rasterErrorM
	}
	if s.RasterDB, err = change(l, raised); err != nil {
		return s, err
	}
	better := c
	better.BiasDB++
	other, err := compute(l, p, better)
	if err != nil {
		return s, err
	}
	s.ChancePct = other.ChancePct - r.ChancePct
	return s, nil
}

// taller is the station on a mast of some metres more, its feeder as much longer.
func (s *Station) taller(m float64) *Station {
	t := *s
	t.AglM += m
	if t.Run.LengthM > 0 {
		t.Run.LengthM += m
	}
	return &t
}
