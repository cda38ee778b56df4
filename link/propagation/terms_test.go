package propagation

import (
	"math"
	"strings"
	"testing"
)

// The symbols are those of Rec. ITU-R P.1812, in the order in which results are printed.
func TestTermsList(t *testing.T) {
	const want = "Lbfs Lb0p Lb0beta Lbulla_k50 Lbulls_k50 Ldsph_k50 Ld50 Ldbeta Fi Ldp Lbd50 Lbd Lminb0p Lba Lminbap Lbda Lbam Lbs Lbc Lloc Lb Ep " +
		"theta theta_t theta_r dlt dlr dtm dlm ae hst hsr hstd hsrd hte hre hm hts hrs omega beta0"
	var all Terms
	var got []string
	for _, term := range all.List() {
		got = append(got, term.Symbol)
	}
	if s := strings.Join(got, " "); s != want {
		t.Errorf("symbols\n got %s\nwant %s", s, want)
	}
}

func TestTermsListLeavesOutWhatIsNotComputed(t *testing.T) {
	if got := noTerms.List(); len(got) != 0 {
		t.Errorf("terms of nothing: %v", got)
	}
	some := noTerms
	some.Hm, some.Lb = 0, 120.5
	got := some.List()
	want := []Term{{"Lb", "dB", 120.5}, {"hm", "m", 0}}
	if len(got) != 2 || got[0] != want[0] || got[1] != want[1] {
		t.Errorf("got %v, want %v", got, want)
	}
}

func TestTermsOfMethods(t *testing.T) {
	for _, tc := range []struct {
		model Model
		want  string
	}{
		{FreeSpace, "Lbfs Lb theta theta_t theta_r dlt dlr ae hts hrs"},
		{P526, "Lbfs Lbulla_k50 Lbulls_k50 Ldsph_k50 Ld50 Lbd50 Lb theta theta_t theta_r dlt dlr ae hstd hsrd hts hrs omega"},
	} {
		l, err := tc.model.Loss(level(10, 20))
		if err != nil {
			t.Fatal(err)
		}
		var got []string
		for _, term := range l.Terms.List() {
			got = append(got, term.Symbol)
		}
		if s := strings.Join(got, " "); s != tc.want {
			t.Errorf("%s\n got %s\nwant %s", tc.model.Name, s, tc.want)
		}
		if l.DB != l.Terms.Lb || math.IsNaN(l.DB) {
			t.Errorf("%s: loss %g, Lb %g", tc.model.Name, l.DB, l.Terms.Lb)
		}
	}
}
