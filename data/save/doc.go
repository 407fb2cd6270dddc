// Package save writes a file whole or not at all, and never over an existing
// one unasked.
//
// The content goes into a new file in the folder of the target, readable by
// its owner only, is brought to the disk, and only then gets its name: through
// a hard link, which fails if the name is taken, or, where replacing was asked
// for, through a rename. Whoever reads the name therefore sees the old file or
// the new one, never a part of it, and of several who save under one name at
// the same time exactly one succeeds.
//
// File systems without hard links (exFAT, some network shares) get the
// content written straight to the name, opened so that it fails if the name is
// taken; there a reader may see the file while it grows, and after an error it
// is removed.
package save
