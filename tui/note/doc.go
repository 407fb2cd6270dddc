// Package note is the screen of the last stage: the note, line for line as it
// will be saved, with a remark to add and a search. Saving is a key of the root.
package note
