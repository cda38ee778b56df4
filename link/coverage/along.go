package coverage

import (
	"context"
	"errors"
	"math"
	"runtime"

	"fellreach/antenna"
	"fellreach/link"
	"fellreach/link/propagation"
	"fellreach/terrain"
	"fellreach/terrain/raster"

	"golang.org/x/sync/errgroup"
)

// A Ride is a track as sites serve it.
type Ride struct {
	Sites []string
	AimDB float64
	Stops []Stop
	// MarginDB holds the margin with each site at each stop, NaN where the ground between them is
	// not known; BestDB the largest.
	MarginDB [][]float64
	BestDB   []float64
}

// Along works out the link to every stop with every site, by the direct method on the profile that
// a link takes. progress, if not nil, is told when a stop is done, from several goroutines.
func Along(ctx context.Context, ground *raster.Ground, sites []Site, stops []Stop, progress func()) (*Ride, error) {
	r := &Ride{Stops: stops, AimDB: sites[0].AimDB, BestDB: make([]float64, len(stops))}
	for i := range r.BestDB {
		r.BestDB[i] = math.NaN()
	}
	for i := range sites {
		s := &sites[i]
		places, err := link.NewPlaces(s.Task.Link, s.Task.Conditions)
		if err != nil {
			return nil, err
		}
		margins := make([]float64, len(stops))
		work, ctx := errgroup.WithContext(ctx)
		work.SetLimit(runtime.GOMAXPROCS(0))
		for k := range stops {
			work.Go(func() (err error) {
				if ctx.Err() != nil {
					return ctx.Err()
				}
				margins[k], err = s.Task.marginAt(ground, places, stops[k])
				if progress != nil {
					progress()
				}
				return err
			})
		}
		if err := work.Wait(); err != nil {
			return nil, err
		}
		r.Sites, r.MarginDB = append(r.Sites, s.Name), append(r.MarginDB, margins)
		for k, margin := range margins {
			if !math.IsNaN(margin) && !(r.BestDB[k] >= margin) {
				r.BestDB[k] = margin
			}
		}
	}
	return r, nil
}

// marginAt is the smaller margin of both directions with the far end at a stop, NaN where the ground
// is not known.
func (t *Task) marginAt(ground *raster.Ground, places *link.Places, at Stop) (float64, error) {
	p, err := ground.Profile(t.Link.From.At, at.At)
	var void *terrain.VoidError
	if errors.As(err, &void) {
		return math.NaN(), nil
	}
	if err != nil {
		return 0, err
	}
	coverM := 0.0
	if class, known, err := ground.CoverAt(at.At); err == nil && known {
		coverM = class.HeightM
	}
	fromAglM, toAglM, clearM := places.Heights()
	p = p.Cleared(clearM, 0)
	if g := t.Link.From.GroundAslM; g != nil {
		p.AslM[0] = *g
	}
	path := propagation.Path{
		Profile: p, TxAglM: fromAglM, RxAglM: toAglM, VerticalShare: 1, DeltaN: t.Conditions.DeltaN, N0: t.Conditions.N0,
		TimePct: 50, LocationPct: 50, LatDeg: p.Points[len(p.Points)/2].Lat(), TxCoastKm: noCoastKm, RxCoastKm: noCoastKm,
	}
	if first, last, ok := p.CoastKm(); ok {
		path.TxCoastKm, path.RxCoastKm = first, last
	}
	margin := math.Inf(1)
	for i := range places.Directions {
		m, err := t.marginOn(path, places, &places.Directions[i], coverM)
		if err != nil {
			return 0, err
		}
		margin = min(margin, m)
	}
	return margin, nil
}

// marginOn is the margin of one direction on a path.
func (t *Task) marginOn(path propagation.Path, places *link.Places, d *link.PlacesDirection, coverM float64) (float64, error) {
	path.FreqHz = d.FreqHz
	seen, err := propagation.FreeSpace.Loss(path)
	if err != nil {
		return 0, err
	}
	p := link.PlacePath{
		Toward: antenna.Direction{AzDeg: path.AzDeg, ElDeg: seen.TxElDeg}, Back: antenna.Direction{AzDeg: path.BackAzDeg, ElDeg: seen.RxElDeg},
		Trans: seen.TransHorizon, LengthKm: path.LengthKm(), TxAslM: seen.Terms.Hts, RxAslM: seen.Terms.Hrs, LatDeg: path.LatDeg,
	}
	sentDBi, caughtDB, verticalPart := d.Antennas(&p)
	path.VerticalShare = verticalPart
	loss, err := t.Conditions.Method.Loss(path)
	if err != nil {
		return 0, err
	}
	if places.ComputesFade() {
		if p.MedianLossDB, p.BestLossDB, err = withoutDucting(path, link.MirroredTimePct(t.Link.Aim.AvailabilityPct)); err != nil {
			return 0, err
		}
	}
	location := t.locationDB(d.FreqHz, coverM, combined(loss))
	return d.SentDBm + sentDBi - loss.DB + caughtDB + d.FixedDB - places.FadeDB(d, &p) - location, nil
}

// withoutDucting returns the losses that the fading allowance is made of.
func withoutDucting(path propagation.Path, bestPct float64) (medianDB, bestDB float64, err error) {
	median, err := propagation.P1812WithoutDucting(path)
	if err != nil {
		return 0, 0, err
	}
	path.TimePct = bestPct
	best, err := propagation.P1812WithoutDucting(path)
	return median.DB, best.DB, err
}

// combined is what a loss is made of before the locations are looked at: that of a method without
// these terms moves with them, that of a path too near for P.1812 does not.
func combined(l propagation.Loss) propagation.Combined {
	switch t := l.Terms; {
	case !math.IsNaN(t.Lbc):
		return propagation.Combined{Lb0p: t.Lb0p, Lbc: t.Lbc}
	case !math.IsNaN(t.Ep):
		return propagation.Combined{Lb0p: l.DB, Lbc: math.Inf(-1)}
	}
	return propagation.Combined{Lb0p: math.Inf(-1), Lbc: l.DB}
}

// ClosesShare is the part of the track's stops, 0 to 1, at which the best margin reaches the aim.
func (r *Ride) ClosesShare() float64 {
	closes := 0
	for _, margin := range r.BestDB {
		if margin >= r.AimDB {
			closes++
		}
	}
	return float64(closes) / float64(len(r.BestDB))
}

// LongestGapM is the longest run of stops of one line at which the best margin misses the aim: from
// its first stop to the next one that reaches it, or to the line's end, m, and where along the track
// it begins.
func (r *Ride) LongestGapM() (lengthM, fromM float64) {
	from := math.NaN()
	for i, s := range r.Stops {
		closes := r.BestDB[i] >= r.AimDB
		switch {
		case s.First && closes:
			from = math.NaN()
		case s.First || !closes && math.IsNaN(from):
			from = s.DistM
		}
		if s.DistM-from > lengthM {
			lengthM, fromM = s.DistM-from, from
		}
		if closes {
			from = math.NaN()
		}
	}
	return lengthM, fromM
}
