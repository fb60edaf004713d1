package ground_test

import (
	"testing"

	"github.com/stretchr/testify/assert"

	"emendary/ui/ground"
)

// The numbers of the sixteen colours are common practice.
func TestOf(t *testing.T) {
	for value, want := range map[string]ground.Background{
		"": ground.Unknown, "15;0": ground.Dark, "0;15": ground.Light, "0;default;15": ground.Light,
		"15;default": ground.Unknown, "7;8": ground.Dark, "0;7": ground.Light, "0": ground.Dark,
		"0;16": ground.Unknown, "0;-1": ground.Unknown, ";": ground.Unknown,
	} {
		assert.Equal(t, want, ground.Of(value), "COLORFGBG=%q", value)
	}
}
