package manuscript

import (
	"fmt"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// traitNames has a short name for each trait, in the order of their bits.
var traitNames = []string{"start", "caps", "number", "ordinal", "roman", "initial", "elision", "hyphenated", "suspended", "broken", "heading"}

// show writes a word as its text, traits other than start, and fault.
func show(w Word) string {
	out := w.Text
	for i, name := range traitNames {
		if i > 0 && w.Traits&(1<<i) != 0 {
			out += " " + name
		}
	}
	if w.Fault != NoFault {
		out += fmt.Sprintf(" (%s: %s)", w.Fault, w.Instead)
	}
	return out
}

// one reads a text as a single paragraph of plain text.
func one(t *testing.T, text string) Paragraph {
	t.Helper()
	d, err := Read("manuscript.txt", []byte(text), Options{Format: "text"})
	require.NoError(t, err)
	require.Len(t, d.Paragraphs, 1)
	return d.Paragraphs[0]
}

// The rules are ours, stated where they are coded; the examples are common
// practice in English prose.
func TestWords(t *testing.T) {
	for _, test := range []struct{ rule, text, want string }{
		{"an apostrophe inside belongs", "don't don’t fo’c’s’le o'clock", "don't|don’t|fo’c’s’le|o'clock"},
		{"possessives belong", "the harbour’s mole, James's boat", "the|harbour’s|mole|James's|boat"},
		{"plural possessives belong where no quotation is open", "The pilots’ house and the lads' boat.", "The|pilots’|house|and|the|lads'|boat"},
		{"’ before a word is an apostrophe", "’Tis ’em, ’ospital and ’arbour", "’Tis elision|’em elision|’ospital elision|and|’arbour elision"},
		{"' before a word always elided is an apostrophe", "'Tis true; give 'em rope", "'Tis elision|true|give|'em elision|rope"},
		{"' before a word often elided, nothing closing after", "go 'round the point 'cause of the wind", "go|'round elision|the|point|'cause elision|of|the|wind"},
		{"' before a word often elided opens where one closes after", "'Round the point we went,' said he", "Round|the|point|we|went|said|he"},
		{"' before a lost h", "up at the 'ouse", "up|at|the|'ouse elision"},
		{"a clipped word keeps its apostrophe", "nothin’ doin' o’ th’ wi' an'", "nothin’ elision|doin' elision|o’ elision|th’ elision|wi' elision|an' elision"},
		{"a clipped word inside single quotes", "‘I’m goin’ home,’ he said", "I’m|goin’ elision|home|he|said"},
		{"the last apostrophe closes", "‘He was goin’ and left", "He|was|goin|and|left"},
		{"a plural possessive inside single quotes", "‘The pilots’ house burned,’ he said", "The|pilots’|house|burned|he|said"},
		{"a plural before the closing quote", "‘the pilots’ said he, ‘were gone’", "the|pilots|said|he|were|gone"},
		{"rock ’n’ roll", "rock ’n’ roll, rock-'n'-roll, rock'n'roll", "rock|’n’ elision|roll|rock-'n'-roll hyphenated|rock'n'roll"},
		{"will-o’-the-wisp", "a will-o’-the-wisp", "a|will-o’-the-wisp hyphenated"},
		{"lost letters inside single quotes", "'I says to 'im, ''e's a fool,' said Pell", "I|says|to|'im elision|'e's elision|a|fool|said|Pell"},
		{"an elision opens a quotation", "‘’Tis late—’tis dark,’ said he, “’em too”", "’Tis elision|late|’tis elision|dark|said|he|’em elision|too"},
		{"no space after a closing quote", "‘Come,’said he", "Come|said|he"},
		{"clipped and possessive inside straight quotes", "'The lads' boat's one o' ours,' he said. 'We're lost.'", "The|lads'|boat's|one|o' elision|ours|he|said|We're|lost"},
		{"nested quotes", "‘He said “no” to the lads’ll-drown talk,’ said Pell", "He|said|no|to|the|lads’ll-drown hyphenated|talk|said|Pell"},
		{"short years", "the ’90s and '14", "the|’90s number ordinal elision|and|'14 number elision"},
		{"long years", "the 1920s and 1920’s", "the|1920s number ordinal|and|1920’s number ordinal"},
		{"hyphens of three kinds join", "harbour-master harbour\u2010master harbour\u2011master", "harbour-master hyphenated|harbour\u2010master hyphenated|harbour\u2011master hyphenated"},
		{"dashes do not", "harbour—master harbour–master harbour--master", "harbour|master|harbour|master|harbour|master"},
		{"suspended at the end", "two- and three-masted, pre-, or post-war", "two- suspended|and|three-masted hyphenated|pre- suspended|or|post-war hyphenated"},
		{"suspended at the start", "half-owner and -master; the ending “-ise”", "half-owner hyphenated|and|-master suspended|the|ending|-ise suspended"},
		{"a stray hyphen is none", "the harbour- was -shut", "the|harbour|was|shut"},
		{"broken at a line end", "the har-\nbour and the harbour-mas-\n  ter", "the|har-bour broken|and|the|harbour-mas-ter hyphenated broken"},
		{"suspended at a line end", "two-\nand three-masted", "two- suspended|and|three-masted hyphenated"},
		{"soft hyphens go", "har\u00ADbour har\u00AD\nbour", "harbour|harbour broken"},
		{"initials", "J. R. Pell, of the U.S. and U.K., at 4 p.m., e.g. here", "J. initial|R. initial|Pell|of|the|U.S. caps initial|and|U.K. caps initial|at|4 number|p.m. initial|e.g. initial|here"},
		{"points that are none of an abbreviation", "3.5mm, 4.2.1a, U.N.-chartered", "3.5mm|4.2.1a|U.N.-chartered hyphenated"},
		{"the possessive of an abbreviation", "the U.S.’s ships and the U.N.’s", "the|U.S.’s caps initial|ships|and|the|U.N.’s caps initial"},
		{"I is an initial only beside another", "So did I. He left. I. K. Pell", "So|did|I|He|left|I. initial|K. initial|Pell"},
		{"a degree", "Pell, Ph.D., came", "Pell|Ph.D. initial|came"},
		{"no space after a point", "the end.Then it began", "the|end|Then|it|began"},
		{"no space after a colon or underscore", "note:this", "note|this"},
		{"titles", "Mr. Pell and Dr. Sallow of St. Anne", "Mr|Pell|and|Dr|Sallow|of|St|Anne"},
		{"numbers", "1,200 3.5 £5 $1,200.50 −4 -4 1914-18", "1,200 number|3.5 number|£5 number|$1,200.50 number|−4 number|-4 number|1914-18 number hyphenated"},
		{"ordinals", "1st 2nd 3rd 4th 11th 12th 13th 21st 22nd 111th 1,001st", "1st number ordinal|2nd number ordinal|3rd number ordinal|4th number ordinal|11th number ordinal|12th number ordinal|13th number ordinal|21st number ordinal|22nd number ordinal|111th number ordinal|1,001st number ordinal"},
		{"a fraction's denominator is no wrong ordinal", "27-1/2th", "27-1 number hyphenated|2th number ordinal"},
		{"wrong ordinals", "2th 11st 22th 1ND", "2th number ordinal (wrong ordinal: 2nd)|11st number ordinal (wrong ordinal: 11th)|22th number ordinal (wrong ordinal: 22nd)|1ND number ordinal (wrong ordinal: 1ST)"},
		{"letters for digits", "l9l4 1O 1,2OO 2lst 192Os I914 o56", "l9l4 number (letter for a digit: 1914)|1O number (letter for a digit: 10)|1,2OO number (letter for a digit: 1,200)|2lst number ordinal (letter for a digit: 21st)|192Os number ordinal (letter for a digit: 1920s)|I914 number (letter for a digit: 1914)|o56 number (letter for a digit: 056)"},
		{"no letters for digits", "20l I95 O2 B5 10m 4x4 5s", "20l|I95|O2|B5|10m|4x4|5s number ordinal"},
		{"digits for letters", "hel1o w0rd 0nce 0f th1s fie1d HARB0UR hell0 1ittle", "hel1o (digit for a letter: hello)|w0rd (digit for a letter: word)|0nce (digit for a letter: once)|0f (digit for a letter: of)|th1s (digit for a letter: this)|fie1d (digit for a letter: field)|HARB0UR (digit for a letter: HARBOUR)|hell0 (digit for a letter: hello)|1ittle (digit for a letter: little)"},
		{"no digits for letters", "B1 H2O mp3 10am 1am A10 W1A 1min", "B1|H2O|mp3|10am|1am|A10|W1A|1min"},
		{"turned apostrophes", "‘tis ‘em don‘t the ‘90s rock ‘n’ roll", "‘tis elision (turned apostrophe: ’tis)|‘em elision (turned apostrophe: ’em)|don‘t (turned apostrophe: don’t)|the|‘90s number ordinal elision (turned apostrophe: ’90s)|rock|‘n’ elision (turned apostrophe: ’n’)|roll"},
		{"‘Tis with a quote that closes after punctuation opens it", "‘Tis so,’ he said", "Tis|so|he|said"},
		{"Roman numerals", "XIV xiv iii MCMXIV I mix civil did MIX V", "XIV caps roman|xiv roman|iii roman|MCMXIV caps roman|I|mix|civil|did|MIX caps|V"},
		{"capitals", "HARBOUR HARBOUR’S A UK McKay", "HARBOUR caps|HARBOUR’S caps|A|UK caps|McKay"},
		{"combining marks compose", "cafe\u0301", "café"},
		{"a ligature is a letter", "ﬁsh", "ﬁsh"},
		{"other scripts", "гавань λιμήν 港口", "гавань|λιμήν|港|口"},
		{"a fraction is a number", "1½ ½", "1½ number|½ number"},
	} {
		t.Run(test.rule, func(t *testing.T) {
			var got []string
			for _, w := range one(t, test.text).Words {
				got = append(got, show(w))
			}
			assert.Equal(t, test.want, strings.Join(got, "|"))
		})
	}
}

// Source of the rule: the comment at sentence; the examples are ours.
func TestSentenceStarts(t *testing.T) {
	for _, test := range []struct{ text, want string }{
		{"The gun spoke. The town woke! Who slept? None … But she did.", "The The Who None But"},
		{"Mr. Pell met Dr. Sallow at St. Anne in ch. 3 of No. 5.", "Mr"},
		{"No. He did not.", "No He"},
		{"Is he the Gov? He is the Capt! Yes.", "Is He Yes"},
		{"He met J. R. Pell there.", "He"},
		{"He said, “Come here.” Then he left.", "He Come Then"},
		{"“Where?” he said. “Here.”", "Where Here"},
		{"“Where?” Pell said.", "Where Pell"},
		{"the so-called “Great” harbour", "the"},
		{"He said: ‘Come.’ She came.", "He Come She"},
		{"It ended (so he said.) Then it began.", "It Then"},
		{"He went ... and came... Back again.", "He Back"},
		{"3 p.m. Then", "3 Then"},
	} {
		var got []string
		for _, w := range one(t, test.text).Words {
			if w.Traits&SentenceStart != 0 {
				got = append(got, w.Text)
			}
		}
		assert.Equal(t, test.want, strings.Join(got, " "), test.text)
	}
}

// Source of the rule: the comments at markSpeech and Setting.
func TestSettings(t *testing.T) {
	for _, test := range []struct{ text, want string }{
		{"“Come,” he said, “at once.”", "S NN SS"},
		{"\"Come,\" he said, \"at once.\"", "S NN SS"},
		{"‘Come,’ he said, ‘at once.’", "S NN SS"},
		{"“He said ‘no’ to me,” said Pell.", "SSSSS NN"},
		{"the ‘harbour’ of a friend", "NNNNN"},
		{"“It was late and", "SSSS"},
		{"a _foreign_ word and *two more* here", "NINNIIN"},
		{"“I _said_ so”", "SSS"},
		{"«Venez,» dit-il", "SN"},
		{"a 6\" plank was cut", "NNNNN"},
		{"the word—“harbour”—stood", "NNSN"},
		{"“the ‘great mole” was shut", "SSS NN"},
		{"“one” ‘Two “three” four’ five", "SSSSN"},
		{"don’t “it’s the pilots’ house” now", "NSSSSN"},
	} {
		var got strings.Builder
		for _, w := range one(t, test.text).Words {
			got.WriteString(map[Setting]string{Narration: "N", Speech: "S", Italics: "I", Quotation: "Q", Heading: "H", Note: "T"}[w.Setting])
		}
		assert.Equal(t, strings.ReplaceAll(test.want, " ", ""), got.String(), test.text)
	}
}

func TestBase(t *testing.T) {
	for _, test := range []struct{ text, base, possessive string }{
		{"harber’s", "harber", "’s"},
		{"HARBER'S", "HARBER", "'S"},
		{"pilots’", "pilots", "’"},
		{"James’s", "James", "’s"},
		{"o’", "o’", ""},
		{"nothin’", "nothin’", ""},
		{"’s", "’s", ""},
		{"’", "’", ""},
		{"s", "s", ""},
		{"", "", ""},
		{"harber", "harber", ""},
		{"Marx’", "Marx", "’"},
		{"harber‘s", "harber", "‘s"},
		{"harberʼs", "harber", "ʼs"},
		{"harber''", "harber''", ""},
		{"é’", "é’", ""},
	} {
		base, possessive := Base(test.text)
		assert.Equal(t, [2]string{test.base, test.possessive}, [2]string{base, possessive}, test.text)
	}
}

func TestAddressesArePassedOver(t *testing.T) {
	d, err := Read("m.txt", []byte("See https://quay.example/a?b=1(c). Or www.quay.example, pell@quay.example; (quay.example/mole) /var/log/quay, C:\\quay\\mole.txt, mole.pdf, @pell and #sallow, max_depth, and/or he/she, No. #1, end.Then, a_b.\n"), Options{})
	require.NoError(t, err)
	var got []string
	for _, p := range d.Passed {
		got = append(got, p.Reason+" "+p.Text)
	}
	assert.Equal(t, []string{
		"URL https://quay.example/a?b=1(c)", "URL www.quay.example", "e-mail address pell@quay.example", "URL quay.example/mole",
		"file path /var/log/quay", `file path C:\quay\mole.txt`, "file path mole.pdf", "handle @pell", "tag #sallow", "code max_depth", "code a_b",
	}, got)
	var words []string
	for _, w := range d.Paragraphs[0].Words {
		words = append(words, w.Text)
	}
	assert.Equal(t, "See Or and and or he she No 1 end Then", strings.Join(words, " "))
}
