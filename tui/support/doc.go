// Package support is the screen of the fifth stage: the native wave and what a
// pump leaves of it, over one another, on the fitted load.
//
// It begins with the forecast where there is one, under the posing coupled: a
// ventricle, a pump at a speed, and the load. Left and right go to the yardsticks
// beside it, the posings scaled and late-valve, which take a share of the flow and
// know of no ventricle. As long as there is no forecast they stand alone, and the
// head says that it is not computed yet, or why there is none. A yardstick is
// never called a forecast; retained pulse under the scaled posing is an identity,
// and never shown without saying so.
//
// Up and down move speed or share through the states that the study computed;
// nothing is computed for that. All speeds are drawn within the same bounds, and
// so are all shares of both yardsticks, so that a step changes the curve and few
// words.
//
// Other views hold the sweep over all speeds or shares, with the speed from which
// the valve stays shut; power, of the arterial side or of ventricle, pump and
// arteries; the indices and figures of both waves; what is held equal; and of the
// forecast what would prove it wrong and what it depends on, and the parameters of
// ventricle and pump.
package support
