package antenna

import (
	"errors"
	"fmt"
)

// A Length is that of an antenna's part: in metres, in wavelengths of the design frequency, or,
// as the zero value, whatever makes the antenna resonant there.
type Length struct{ M, Wavelengths float64 }

// A DipoleSpec describes a straight rod along the vertical axis of the antenna's frame.
type DipoleSpec struct {
	Length Length
	// FeedAt is where the rod is fed, as a fraction of its length from the bottom end, 0.01 to
	// 0.99; 0.5 is its middle.
	FeedAt    float64
	DiameterM float64
	Material  Material
}

// Dipole returns a straight rod of any length up to ten wavelengths, solved by the closed forms
// for a sinusoidal current: pattern and directivity from the current's far field, impedance by
// the induced-EMF method at the rod's surface, conductor loss from the skin effect.
//
// Solve refuses a rod thicker than a tenth of its length, and one fed where a sinusoidal current
// is small (near the middle of a full wave), since it gives no impedance there.
func Dipole(spec DipoleSpec) (Design, error) {
	if err := spec.check(); err != nil {
		return Design{}, err
	}
	return Design{Kind: "dipole", Solve: spec.solve}, nil
}

func (spec DipoleSpec) check() error {
	errs := []error{
		within("feed_at", spec.FeedAt, 0.01, 0.99, ""),
		positive("diameter", spec.DiameterM, "m"),
		spec.Material.check(),
	}
	if spec.Length.M != 0 {
		errs = append(errs, positive("length", spec.Length.M, "m"))
	}
	if spec.Length.Wavelengths != 0 {
		errs = append(errs, within("length", spec.Length.Wavelengths, shortestWl, longestWl, "wl"))
	}
	if spec.Length.M != 0 && spec.Length.Wavelengths != 0 {
		errs = append(errs, errors.New("length is given both in metres and in wavelengths: give one"))
	}
	return errors.Join(errs...)
}

// The lengths for which the closed forms are evaluated, in wavelengths.
const (
	shortestWl = 0.002
	longestWl  = 10
)

func (spec DipoleSpec) solve(s Setting) (Solution, error) {
	s, err := s.Checked()
	if err != nil {
		return Solution{}, err
	}
	lengthM, err := spec.lengthM(s.DesignHz)
	if err != nil {
		return Solution{}, err
	}
	rod, err := spec.rod(lengthM, s.FreqHz)
	if err != nil {
		return Solution{}, err
	}
	impedance, err := rod.impedanceOhm()
	if err != nil {
		return Solution{}, err
	}
	return Solution{
		Pattern:      rod.pattern(),
		ImpedanceOhm: impedance,
		Efficiency:   rod.efficiency(),
		Source:       fmt.Sprintf("dipole of %.4g m, %s, sinusoidal current, induced EMF", lengthM, spec.Material.Name),
		Notes:        append(rod.notes(), s.mastNote("the closed forms")...),
	}, nil
}

// rod returns the sinusoidal current on a rod of the spec of the given length.
func (spec DipoleSpec) rod(lengthM, freqHz float64) (sinusoid, error) {
	if spec.DiameterM > lengthM/10 {
		return sinusoid{}, fmt.Errorf("diameter %g m is too thick for a rod of %.4g m: at most a tenth of the length is allowed", spec.DiameterM, lengthM)
	}
	wavelengthM := WavelengthM(freqHz)
	if err := within("length", lengthM/wavelengthM, shortestWl, longestWl, "wl"); err != nil {
		return sinusoid{}, err
	}
	return newSinusoid(sinusoid{
		wavelengthM: wavelengthM,
		radiusM:     spec.DiameterM / 2,
		lowerM:      spec.FeedAt * lengthM,
		upperM:      (1 - spec.FeedAt) * lengthM,
		ohmPerM:     spec.Material.ImpedanceOhmPerM(freqHz, spec.DiameterM/2),
	})
}

// impedanceOhm returns the impedance of a rod of the spec of the given length.
func (spec DipoleSpec) impedanceOhm(lengthM, freqHz float64) (complex128, error) {
	rod, err := spec.rod(lengthM, freqHz)
	if err != nil {
		return 0, err
	}
	return rod.impedanceOhm()
}

// lengthM returns the length of the rod, cut at the design frequency if it is to be resonant:
// the length below a half wave at which the reactance is zero.
func (spec DipoleSpec) lengthM(designHz float64) (float64, error) {
	wavelengthM := WavelengthM(designHz)
	if spec.Length.M != 0 {
		return spec.Length.M, nil
	}
	if spec.Length.Wavelengths != 0 {
		return spec.Length.Wavelengths * wavelengthM, nil
	}
	var failure error
	reactance := func(wl float64) float64 {
		z, err := spec.impedanceOhm(wl*wavelengthM, designHz)
		failure = errors.Join(failure, err)
		return imag(z)
	}
	const shorter, longer = 0.35, 0.52
	below, above := reactance(shorter), reactance(longer)
	if failure != nil {
		return 0, failure
	}
	if below >= 0 || above <= 0 {
		return 0, fmt.Errorf("no resonant length between %g and %g wl for diameter %g m at %g Hz: give the length, or make the rod thinner", shorter, longer, spec.DiameterM, designHz)
	}
	return bisect(shorter, longer, reactance) * wavelengthM, nil
}
