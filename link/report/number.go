package report

import (
	"math"
	"strconv"
	"strings"
)

// decimals writes a number with a fixed count of decimals, without a minus before zero.
func decimals(x float64, count int) string {
	text := strconv.FormatFloat(x, 'f', count, 64)
	if strings.Trim(text, "-0.") == "" {
		return strings.TrimPrefix(text, "-")
	}
	return text
}

// signed writes a level or margin with its sign.
func signed(x float64, count int) string {
	text := decimals(x, count)
	if strings.HasPrefix(text, "-") || strings.Trim(text, "0.") == "" {
		return text
	}
	return "+" + text
}

// azimuth writes an azimuth with one decimal, 0 to 359.9.
func azimuth(deg float64) string {
	rounded := math.Round(deg*10) / 10
	if rounded >= 360 {
		rounded -= 360
	}
	return decimals(rounded, 1)
}

// counted writes a count with its word.
func counted(n int, one, many string) string {
	if n == 1 {
		return "1 " + one
	}
	return strconv.Itoa(n) + " " + many
}

// percent writes a chance with as many digits as it deserves near its ends.
func percent(pct float64) string {
	switch {
	case pct > 99.9:
		return "> 99.9 %"
	case pct < 0.1:
		return "< 0.1 %"
	case pct > 99 || pct < 1:
		return decimals(pct, 1) + " %"
	}
	return decimals(pct, 0) + " %"
}
