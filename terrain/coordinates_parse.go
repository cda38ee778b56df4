package terrain

import (
	"fmt"
	"math"
	"strconv"
	"strings"
	"unicode"
)

// ParseCoordinates reads a place in one of three notations, capital letters or not:
//
//   - decimal degrees: "47.5231 N, 20.1180 W", or with signs, latitude first: "47.5231, -20.1180";
//   - degrees, minutes and seconds, or degrees and decimal minutes, with signs of their own or
//     with spaces: 47°31'23.2"N 20°07'05"W, "47 31 23.2 N, 20 7 5 W", 47°31.387'N 20°7.08'W;
//   - "UTM 27N 441250 5263420": zone, hemisphere, easting and northing in metres. The letter is N
//     or S for the hemisphere; the letter of a latitude band is refused.
//
// Latitudes are -90 to 90, longitudes -180 to 180 degrees, minutes and seconds below 60. An error
// says what was understood and what is allowed.
func ParseCoordinates(text string) (Coordinates, error) {
	c, err := parseCoordinates(text)
	if err != nil {
		return Coordinates{}, fmt.Errorf("coordinates %s: %w", quoted(text), err)
	}
	return c, nil
}

// maxCoordinatesLen bounds a text that can be a place; the longest usual spelling has about 50.
const maxCoordinatesLen = 200

func parseCoordinates(text string) (Coordinates, error) {
	if len(text) > maxCoordinatesLen {
		return Coordinates{}, fmt.Errorf("the text has %d bytes, over %d", len(text), maxCoordinatesLen)
	}
	plain := strings.ToUpper(strings.TrimSpace(text))
	if rest, is := strings.CutPrefix(plain, "UTM"); is {
		return parseUTM(rest)
	}
	tokens, err := scanAngles(plain)
	if err != nil {
		return Coordinates{}, err
	}
	first, second, err := splitAngles(tokens)
	if err != nil {
		return Coordinates{}, err
	}
	return latLon(first, second)
}

// quoted is the text in quotation marks, shortened where it is long.
func quoted(text string) string {
	if runes := []rune(text); len(runes) > 60 {
		text = string(runes[:60]) + "..."
	}
	return strconv.Quote(text)
}

// usage ends the errors of texts that are in none of the notations.
const usage = `write "47.5231 N, 20.1180 W", 47°31'23.2"N 20°07'05"W or "UTM 27N 441250 5263420"`

// A token of an angle: a number, a letter N, S, E, W, a sign of unit °, ', ", or a comma.
type token struct {
	kind  rune // '0' for a number, else the sign itself
	text  string
	value float64
}

// signs maps the many spellings of the angle's signs to one each. Two minute signs make a second
// sign, in scanAngles.
var signs = map[rune]rune{
	'°': '°', 'º': '°', '˚': '°',
	'\'': '\'', '′': '\'', '’': '\'', '‘': '\'', '´': '\'', 'ʹ': '\'',
	'"': '"', '″': '"', '”': '"', '“': '"', 'ʺ': '"',
	',': ',', ';': ',',
	'N': 'N', 'S': 'S', 'E': 'E', 'W': 'W',
}

// scanAngles cuts a text in capitals into tokens.
func scanAngles(text string) ([]token, error) {
	var tokens []token
	runes := []rune(text)
	for i := 0; i < len(runes); {
		r := runes[i]
		switch sign, known := signs[r]; {
		case unicode.IsSpace(r):
			i++
		case known && sign == '\'' && len(tokens) > 0 && tokens[len(tokens)-1].kind == '\'' && signs[runes[i-1]] == '\'':
			tokens[len(tokens)-1] = token{kind: '"', text: `"`}
			i++
		case known:
			tokens = append(tokens, token{kind: sign, text: string(r)})
			i++
		default:
			t, length, err := scanNumber(runes[i:])
			if err != nil {
				return nil, err
			}
			tokens = append(tokens, t)
			i += length
		}
	}
	return tokens, nil
}

// scanNumber reads a decimal number with an optional sign.
func scanNumber(runes []rune) (token, int, error) {
	n := 0
	for n < len(runes) && (unicode.IsDigit(runes[n]) || runes[n] == '.' || n == 0 && strings.ContainsRune("+-−", runes[n])) {
		n++
	}
	text := strings.Replace(string(runes[:n]), "−", "-", 1)
	value, err := strconv.ParseFloat(text, 64)
	if n == 0 {
		return token{}, 0, fmt.Errorf("%q is no part of coordinates: %s", runes[0], usage)
	}
	if err != nil || math.IsInf(value, 0) {
		return token{}, 0, fmt.Errorf("%q is not a number: %s", text, usage)
	}
	return token{'0', text, value}, n, nil
}

// splitAngles divides the tokens into the two angles: at the comma, else by the letters, else by
// the degree signs, else in the middle.
func splitAngles(tokens []token) (first, second []token, err error) {
	at := positions(tokens, ",")
	if len(at) == 1 {
		return tokens[:at[0]], tokens[at[0]+1:], nil
	}
	if len(at) > 1 {
		return nil, nil, fmt.Errorf("%d commas: write decimals with a dot and one comma between latitude and longitude", len(at))
	}
	letters, degrees := positions(tokens, "NSEW"), positions(tokens, "°")
	switch {
	case len(letters) == 2 && letters[1] == len(tokens)-1:
		return tokens[:letters[0]+1], tokens[letters[0]+1:], nil
	case len(letters) == 2 && letters[0] == 0:
		return tokens[:letters[1]], tokens[letters[1]:], nil
	case len(letters) == 0 && len(degrees) == 2 && degrees[1] > 1:
		return tokens[:degrees[1]-1], tokens[degrees[1]-1:], nil
	case len(letters) == 0 && len(degrees) == 0 && len(tokens) > 0 && len(tokens)%2 == 0:
		return tokens[:len(tokens)/2], tokens[len(tokens)/2:], nil
	}
	return nil, nil, fmt.Errorf("it does not divide into a latitude and a longitude: %s", usage)
}

// positions returns where tokens of the given kinds stand.
func positions(tokens []token, kinds string) []int {
	var at []int
	for i, t := range tokens {
		if strings.ContainsRune(kinds, t.kind) {
			at = append(at, i)
		}
	}
	return at
}

// latLon joins two angles: by their letters, or latitude first.
func latLon(first, second []token) (Coordinates, error) {
	a, err := parseAngle(first)
	if err != nil {
		return Coordinates{}, err
	}
	b, err := parseAngle(second)
	if err != nil {
		return Coordinates{}, err
	}
	if a.isLat() && b.isLat() || a.isLon() && b.isLon() {
		return Coordinates{}, fmt.Errorf("both angles are of the same kind (%c and %c): one of N, S and one of E, W is due", a.letter, b.letter)
	}
	if a.isLon() || b.isLat() {
		a, b = b, a
	}
	if math.Abs(a.deg) > 90 {
		return Coordinates{}, fmt.Errorf("understood as latitude %g: allowed are -90 to 90 degrees; latitude stands first unless letters say otherwise", a.deg)
	}
	if math.Abs(b.deg) > 180 {
		return Coordinates{}, fmt.Errorf("understood as longitude %g: allowed are -180 to 180 degrees", b.deg)
	}
	return Coordinates{Lat: a.deg, Lon: b.deg}, nil
}

// An angle is a value in degrees with its letter N, S, E, W, or 0.
type angle struct {
	deg    float64
	letter rune
}

func (a angle) isLat() bool { return a.letter == 'N' || a.letter == 'S' }
func (a angle) isLon() bool { return a.letter == 'E' || a.letter == 'W' }

// parseAngle reads degrees, with minutes and seconds or without, and a letter before or after.
func parseAngle(tokens []token) (angle, error) {
	var a angle
	if n := len(tokens); n > 0 && strings.ContainsRune("NSEW", tokens[n-1].kind) {
		a.letter, tokens = tokens[n-1].kind, tokens[:n-1]
	} else if n > 0 && strings.ContainsRune("NSEW", tokens[0].kind) {
		a.letter, tokens = tokens[0].kind, tokens[1:]
	}
	negative := len(tokens) > 0 && strings.HasPrefix(tokens[0].text, "-")
	if len(tokens) > 0 && a.letter != 0 && strings.ContainsAny(tokens[0].text[:1], "+-") {
		return a, fmt.Errorf("%s has a sign and the letter %c: write one of them", tokens[0].text, a.letter)
	}
	size, err := sexagesimal(tokens)
	if err != nil {
		return a, err
	}
	a.deg = size
	if negative || a.letter == 'S' || a.letter == 'W' {
		a.deg = -size
	}
	return a, nil
}

// sexagesimal reads the size of an angle: one to three numbers, each followed by its sign or not.
func sexagesimal(tokens []token) (deg float64, err error) {
	units := [...]struct {
		sign   rune
		name   string
		perDeg float64
	}{{'°', "degrees", 1}, {'\'', "minutes", 60}, {'"', "seconds", 3600}}
	unit := 0
	for i := 0; i < len(tokens); unit++ {
		t := tokens[i]
		if t.kind != '0' || unit == len(units) {
			return 0, fmt.Errorf("%q is out of place in an angle: %s", t.text, usage)
		}
		if unit > 0 && (!(t.value < 60) || strings.ContainsAny(t.text, "+-")) {
			return 0, fmt.Errorf("understood as %s %s: allowed are 0 to below 60", t.text, units[unit].name)
		}
		deg += math.Abs(t.value) / units[unit].perDeg
		i++
		if i < len(tokens) && tokens[i].kind == units[unit].sign {
			i++
		}
		if i < len(tokens) && strings.Contains(t.text, ".") {
			return 0, fmt.Errorf("%s %s have a fraction, yet more follows: only the last number may have one", t.text, units[unit].name)
		}
	}
	if unit == 0 {
		return 0, fmt.Errorf("an angle is missing: %s", usage)
	}
	return deg, nil
}

// Codes of the EPSG register for UTM on WGS 84 are these plus the zone, 1 to 60.
const (
	utmNorth = 32600
	utmSouth = 32700
)

// parseUTM reads "27N 441250 5263420", what stands after "UTM".
func parseUTM(text string) (Coordinates, error) {
	const form = `write "UTM 27N 441250 5263420": zone, N or S for the hemisphere, easting, northing`
	fields := strings.Fields(strings.ReplaceAll(text, ",", " "))
	if len(fields) == 4 { // the letter stands alone
		fields = []string{fields[0] + fields[1], fields[2], fields[3]}
	}
	if len(fields) != 3 {
		return Coordinates{}, fmt.Errorf("UTM with %d parts where three are due: %s", len(fields), form)
	}
	epsg, err := utmZone(fields[0])
	if err != nil {
		return Coordinates{}, err
	}
	easting, err1 := strconv.ParseFloat(fields[1], 64)
	northing, err2 := strconv.ParseFloat(fields[2], 64)
	if err1 != nil || err2 != nil {
		return Coordinates{}, fmt.Errorf("%q and %q are not both numbers: %s", fields[1], fields[2], form)
	}
	if !(easting >= 100_000 && easting <= 900_000) {
		return Coordinates{}, fmt.Errorf("understood as easting %g m: allowed are 100000 to 900000; easting stands before northing", easting)
	}
	if !(northing >= 0 && northing <= 10_000_000) {
		return Coordinates{}, fmt.Errorf("understood as northing %g m: allowed are 0 to 10000000", northing)
	}
	return Coordinates{EPSG: epsg, Easting: easting, Northing: northing}, nil
}

// utmZone reads a zone with its hemisphere, "27N", and returns the EPSG code.
func utmZone(text string) (epsg int, err error) {
	digits := strings.TrimRight(text, "ABCDEFGHIJKLMNOPQRSTUVWXYZ")
	zone, err := strconv.Atoi(digits)
	if err != nil || zone < 1 || zone > 60 {
		return 0, fmt.Errorf("%q is no UTM zone: allowed are 1 to 60 with N or S, such as 27N", text)
	}
	switch letter := text[len(digits):]; {
	case letter == "N":
		return utmNorth + zone, nil
	case letter == "S":
		return utmSouth + zone, nil
	case letter == "":
		return 0, fmt.Errorf("UTM zone %d without its hemisphere: write %dN or %dS", zone, zone, zone)
	case len(letter) == 1 && strings.Contains("CDEFGHJKLM", letter):
		return 0, fmt.Errorf("%s is the letter of a latitude band; the letter here is the hemisphere, for band %s the southern: write UTM %dS", letter, letter, zone)
	case len(letter) == 1 && strings.Contains("PQRTUVWX", letter):
		return 0, fmt.Errorf("%s is the letter of a latitude band; the letter here is the hemisphere, for band %s the northern: write UTM %dN", letter, letter, zone)
	}
	return 0, fmt.Errorf("UTM zone %q: the letter is N or S, for the hemisphere", text)
}
