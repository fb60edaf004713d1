// Package manuscript reads manuscripts and writes emended copies of them.
package manuscript
