// Package field is a text field of one line: a value, a place in it, and the
// keys that edit it. It runs no program, reads no clipboard and draws no colour;
// the place is marked by a bar between the letters, so that it is seen on every
// terminal. What was typed or pasted is shown cleaned, letter by letter.
package field
