// Package support is the screen of the fifth stage: the native wave and what a
// steady pump leaves of it, over one another, on the fitted load.
//
// Up and down move the pump's share of the flow through the states that the
// study computed, left and right the posing; nothing is computed for that. All
// shares of both posings are drawn within the same bounds, so that
// a step changes the curve and one line of words. Retained pulse under the
// scaled posing is an identity, and never shown without saying so.
//
// Other views hold the sweep over all shares, the power that enters the
// arteries, the indices of both waves, and what is held equal.
package support
