package main

import (
	"fmt"
	"io"
	"strconv"
	"strings"

	"fellreach/antenna"
	"fellreach/link/plan"
	"fellreach/link/report"

	"github.com/spf13/cobra"
)

// antennaFlags say how the antenna is installed and what else is asked.
type antennaFlags struct {
	channel          string
	frequency        plan.Frequency
	onMast, standoff plan.Length
	polarization     plan.Polarization
	toward           string
	refine           bool
	pattern, vswr    string
}

func newAntenna(t *terminal) *cobra.Command {
	var out output
	var v antennaFlags
	cmd := &cobra.Command{
		Use:   "antenna PLAN NAME",
		Short: "Show an antenna as installed: impedance, cut lengths, band, pattern",
		Long:  "Show an antenna of a plan as installed: impedance, VSWR and its band, gain, efficiency, and what to\ncut. The antenna stands vertical and free unless told otherwise; azimuth 0 is its facing. The plan\nneeds no sites for it.",
		Args:  arguments(2, 2, "a plan file and an antenna's name"),
		RunE: func(cmd *cobra.Command, args []string) error {
			if err := out.check(args[0]); err != nil {
				return err
			}
			toward, err := v.direction()
			if err != nil {
				return err
			}
			p, err := plan.LoadAntennas(args[0])
			if err != nil {
				return err
			}
			a, err := p.Antenna(v.query(args[1]))
			if err != nil {
				return &usageError{err.Error()}
			}
			a.Toward = toward
			return v.write(t, &out, a)
		},
	}
	out.flags(cmd, "table", "json")
	v.flags(cmd)
	return cmd
}

func (v *antennaFlags) flags(cmd *cobra.Command) {
	f := cmd.Flags()
	f.StringVar(&v.channel, "channel", "", "channel to cut for, where the plan has several")
	f.Var(&quantityFlag{&v.frequency, ""}, "frequency", `frequency to cut for, such as "151.5 MHz", in place of a channel`)
	f.Var(&quantityFlag{&v.onMast, ""}, "on-mast", `put it beside a mast of this diameter, such as "114 mm"`)
	f.Var(&quantityFlag{&v.standoff, ""}, "standoff", "distance from the mast's axis to the antenna's")
	f.Var(&quantityFlag{&v.polarization, "vertical"}, "polarization", `vertical, horizontal, or a slant such as "45 deg"`)
	f.StringVar(&v.toward, "toward", "", "AZ,EL: also give the gain in this direction, in degrees from the facing")
	f.BoolVar(&v.refine, "refine", false, "solve once more on twice the segments and tell the change")
	f.StringVar(&v.pattern, "pattern", "", "draw two cuts of the pattern into this SVG file")
	f.StringVar(&v.vswr, "vswr", "", "draw the VSWR over frequency into this SVG file")
}

func (v *antennaFlags) query(name string) plan.AntennaQuery {
	return plan.AntennaQuery{
		Name: name, Channel: v.channel, FreqHz: float64(v.frequency), MastDiameterM: float64(v.onMast), StandoffM: float64(v.standoff),
		SlantDeg: v.polarization.SlantDeg, Refine: v.refine, Sweep: v.vswr != "",
	}
}

// direction reads --toward.
func (v *antennaFlags) direction() (*antenna.Direction, error) {
	if v.toward == "" {
		return nil, nil
	}
	az, el, ok := strings.Cut(v.toward, ",")
	azDeg, errAz := strconv.ParseFloat(strings.TrimSpace(az), 64)
	elDeg, errEl := strconv.ParseFloat(strings.TrimSpace(el), 64)
	if !ok || errAz != nil || errEl != nil || !(azDeg >= -360 && azDeg <= 360) || !(elDeg >= -90 && elDeg <= 90) {
		return nil, &usageError{fmt.Sprintf("--toward %q is not AZ,EL in degrees, such as 90,0: azimuth -360 to 360, elevation -90 to 90", v.toward)}
	}
	return &antenna.Direction{AzDeg: azDeg, ElDeg: elDeg}, nil
}

// write puts out the pictures and then the result.
func (v *antennaFlags) write(t *terminal, out *output, a *plan.AntennaResult) error {
	pictures := []struct {
		file string
		draw func(io.Writer, *plan.AntennaResult) error
	}{{v.pattern, report.PatternSVG}, {v.vswr, report.VSWRSVG}}
	for _, p := range pictures {
		if p.file == "" {
			continue
		}
		picture := output{file: p.file}
		if err := picture.write(t, func(w io.Writer) error { return p.draw(w, a) }); err != nil {
			return err
		}
	}
	return out.write(t, func(w io.Writer) error {
		if out.format == "json" {
			return report.AntennaJSON(w, a)
		}
		return report.AntennaTable(w, a)
	})
}
