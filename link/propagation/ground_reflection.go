package propagation

import "math/cmplx"

// groundReflection returns the magnitude of the reflection coefficient of sea or land at freqHz, for
// a ray that meets the surface at an angle of the sine sin. Between the polarizations the
// magnitudes are mixed linearly by their share, which is this project's choice. The ground constants
// are those of [NewSmoothEarth].
func groundReflection(freqHz, verticalShare float64, sea bool, sin float64) float64 {
	epsr, sigma := 22.0, 0.003
	if sea {
		epsr, sigma = 80, 5
	}
	horizontal, vertical := fresnelCoefficients(complex(epsr, -18*sigma/(freqHz/1e9)), sin)
	return verticalShare*vertical + (1-verticalShare)*horizontal
}

// fresnelCoefficients returns the magnitudes of the reflection coefficients of a plane surface, 0 to
// 1, for both polarizations. eta is its complex relative permittivity, epsr - j 18 sigma/f with f in
// GHz, sin the sine of the angle between the ray and the surface.
//
// Source: Fresnel's equations, in every handbook of optics.
func fresnelCoefficients(eta complex128, sin float64) (horizontal, vertical float64) {
	s := complex(sin, 0)
	root := cmplx.Sqrt(eta - 1 + s*s)
	return cmplx.Abs((s - root) / (s + root)), cmplx.Abs((eta*s - root) / (eta*s + root))
}
