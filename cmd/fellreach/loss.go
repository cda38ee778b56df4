package main

import (
	"fmt"
	"io"
	"math"
	"os"

	"fellreach/link/plan"
	"fellreach/link/propagation"
	"fellreach/link/report"
	"fellreach/terrain"

	"github.com/spf13/cobra"
)

// lossFlags are the circumstances of a bare profile.
type lossFlags struct {
	frequency          plan.Frequency
	polarization       plan.Polarization
	time, locations    plan.Percent
	spread             plan.Loss
	txHeight, rxHeight plan.Length
	coastTx, coastRx   plan.Distance
	latitude           float64
	n0, deltaN         float64
	method             string
}

func newLoss(t *terminal) *cobra.Command {
	var out output
	v := lossFlags{time: 50, locations: 50, txHeight: 10, rxHeight: 10, coastTx: 500e3, coastRx: 500e3}
	cmd := &cobra.Command{
		Use:   "loss PROFILE.csv",
		Short: "Put a bare profile through a path method",
		Long:  "Put a profile (columns d_km,h_m and optionally R_m,zone; zone 1 sea, 3 coastal, 4 inland) through\na path method and print the basic transmission loss with its terms by the Recommendation's symbols.",
		Args:  arguments(1, 1, "one profile"),
		RunE: func(cmd *cobra.Command, args []string) error {
			if err := out.check(args...); err != nil {
				return err
			}
			if !cmd.Flags().Changed("frequency") {
				return &usageError{`loss needs --frequency, as in --frequency "151.5 MHz"`}
			}
			method, err := propagation.ByName(v.method)
			if err != nil {
				return &usageError{err.Error()}
			}
			path, err := v.path(args[0])
			if err != nil {
				return err
			}
			loss, err := method.Loss(path)
			if err != nil {
				return &usageError{err.Error()}
			}
			if !cmd.Flags().Changed("latitude") && method.Name == propagation.P1812.Name {
				loss.Notes = append(loss.Notes, fmt.Sprintf("no --latitude was given: %g degrees is taken", v.latitude))
			}
			loss.Notes = append(loss.Notes, v.idle(method)...)
			return out.write(t, func(w io.Writer) error {
				if out.format == "json" {
					return report.LossJSON(w, method, loss)
				}
				return report.LossTable(w, method, loss)
			})
		},
	}
	out.flags(cmd, "table", "json")
	v.flags(cmd)
	return cmd
}

func (v *lossFlags) flags(cmd *cobra.Command) {
	f := cmd.Flags()
	f.Var(&quantityFlag{&v.frequency, ""}, "frequency", `frequency, such as "151.5 MHz"`)
	f.Var(&quantityFlag{&v.polarization, "vertical"}, "polarization", "vertical or horizontal")
	f.Var(&quantityFlag{&v.time, "50 %"}, "time", "part of an average year for which the loss is not exceeded, 1 to 50 %")
	f.Var(&quantityFlag{&v.locations, "50 %"}, "locations", "part of the locations at which the loss is not exceeded, 1 to 99 %")
	f.Var(&quantityFlag{&v.spread, "0 dB"}, "location-spread", "standard deviation of the loss over locations")
	f.Var(&quantityFlag{&v.txHeight, "10 m"}, "tx-height", "antenna above ground at the profile's first point")
	f.Var(&quantityFlag{&v.rxHeight, "10 m"}, "rx-height", "antenna above ground at the profile's last point")
	f.Var(&quantityFlag{&v.coastTx, "500 km"}, "coast-tx", "distance over land from the first antenna to the coast")
	f.Var(&quantityFlag{&v.coastRx, "500 km"}, "coast-rx", "distance over land from the last antenna to the coast")
	f.Float64Var(&v.latitude, "latitude", 45, "latitude of the path's centre, degrees, north positive")
	f.Float64Var(&v.n0, "n0", 325, "sea-level surface refractivity, N-units")
	f.Float64Var(&v.deltaN, "delta-n", 45, "fall of refractivity over the lowest kilometre, N-units per km")
	f.StringVar(&v.method, "method", propagation.P1812.Name, "free-space, p526 or p1812")
}

// idle warns of what was asked and changes nothing.
func (v *lossFlags) idle(method propagation.Model) []string {
	switch {
	case method.Name != propagation.P1812.Name && (v.time != 50 || v.locations != 50):
		return []string{fmt.Sprintf("method %s knows neither --time nor --locations: its loss is the median", method.Name)}
	case v.locations != 50 && v.spread == 0:
		return []string{"--locations changes nothing without a --location-spread above 0 dB"}
	}
	return nil
}

// path reads the profile and sets it in the flags' circumstances.
func (v *lossFlags) path(name string) (propagation.Path, error) {
	f, err := os.Open(name)
	if err != nil {
		return propagation.Path{}, err
	}
	defer f.Close()
	profile, err := terrain.ReadProfile(f, name)
	if err != nil {
		return propagation.Path{}, err
	}
	upright := math.Cos(v.polarization.SlantDeg * math.Pi / 180)
	return propagation.Path{
		Profile: profile, FreqHz: float64(v.frequency), TxAglM: float64(v.txHeight), RxAglM: float64(v.rxHeight), VerticalShare: upright * upright,
		DeltaN: v.deltaN, N0: v.n0, TimePct: float64(v.time), LocationPct: float64(v.locations), LocationSpreadDB: float64(v.spread),
		LatDeg: v.latitude, TxCoastKm: float64(v.coastTx) / 1000, RxCoastKm: float64(v.coastRx) / 1000,
	}, nil
}
