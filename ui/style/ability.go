package style

import (
	"strings"

	"github.com/muesli/termenv"

	"emendary/ui/ground"
)

// Ability is what the terminal can do, as far as it can be known without asking it.
type Ability struct {
	Profile    termenv.Profile // how many colours
	Plain      bool            // no bold, underline or reverse either
	ASCII      bool            // signs of our own in ASCII
	Background ground.Background
}

// FromEnvironment reads the abilities from environment variables alone:
// NO_COLOR (https://no-color.org: no colours, other attributes stay), TERM,
// COLORTERM, COLORFGBG, and the locale in LC_ALL, LC_CTYPE or LANG. The first of
// the three that is set decides, as POSIX has it; anything but UTF-8 means ASCII.
func FromEnvironment(getenv func(string) string) Ability {
	term := getenv("TERM")
	a := Ability{
		Background: ground.Of(getenv("COLORFGBG")),
		ASCII:      !utf8Locale(getenv),
		Plain:      term == "" || term == "dumb",
	}
	colorterm := strings.ToLower(getenv("COLORTERM"))
	switch {
	case a.Plain || getenv("NO_COLOR") != "":
		a.Profile = termenv.Ascii
	case colorterm == "truecolor" || colorterm == "24bit" || strings.HasSuffix(term, "-direct"):
		a.Profile = termenv.TrueColor
	case strings.Contains(term, "256color") || colorterm != "":
		a.Profile = termenv.ANSI256
	default:
		a.Profile = termenv.ANSI
	}
	return a
}

func utf8Locale(getenv func(string) string) bool {
	for _, name := range []string{"LC_ALL", "LC_CTYPE", "LANG"} {
		if v := strings.ToLower(getenv(name)); v != "" {
			return strings.Contains(v, "utf-8") || strings.Contains(v, "utf8")
		}
	}
	return false
}
