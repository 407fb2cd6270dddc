// Package tui is the shared vocabulary of the screens: stages, the interface
// that each screen satisfies, the messages between a screen and the root, the
// theme, and the keys that mean the same everywhere.
//
// One package holds one screen; tui/app is the root, a switchboard that never
// looks inside a screen. The rules of all of them:
//
//   - Update changes state and does no work: no file, no fit, no simulation. Work
//     happens in commands, which take a context and return a message with the
//     number of the request; a late number is dropped by who gets it.
//   - View computes nothing: it puts together what is there, in under 1 ms.
//   - A screen shows what package study computed, and nothing else.
//   - Keys are [key.Binding] values; the help and the last row are made from them.
//   - Text from outside comes as [data.Text] only.
package tui
