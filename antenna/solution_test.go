package antenna

import (
	"math"
	"testing"
)

func TestSettingChecked(t *testing.T) {
	s, err := Setting{FreqHz: 151.5e6}.Checked()
	if err != nil || s.DesignHz != 151.5e6 {
		t.Errorf("%+v, %v, want the design frequency filled in", s, err)
	}
	s, err = Setting{FreqHz: 151.5e6, DesignHz: 153e6, MastDiameterM: 0.114, StandoffM: 0.5}.Checked()
	if err != nil || s.DesignHz != 153e6 {
		t.Errorf("%+v, %v, want it as it was", s, err)
	}
	for _, tc := range []struct {
		s    Setting
		says string
	}{
		{Setting{}, "frequency 0 Hz is out of range: 1e+06 to 1e+11 Hz is allowed"},
		{Setting{FreqHz: math.Inf(1)}, "frequency +Inf"},
		{Setting{FreqHz: 150e6, DesignHz: math.NaN()}, "design frequency NaN"},
		{Setting{FreqHz: 150e6, MastDiameterM: -0.1}, "mast diameter -0.1 m"},
		{Setting{FreqHz: 150e6, StandoffM: math.NaN()}, "standoff NaN m"},
	} {
		_, err := tc.s.Checked()
		wantError(t, "setting", err, tc.says)
	}
}
