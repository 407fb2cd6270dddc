// Package layout puts text into cells: columns that are padded and cut, blocks
// beside one another, paragraphs wrapped, and a view cut to its area. Widths
// are those of [data.Text]. Everything that goes in is cleaned, except what a
// plot has drawn.
package layout
