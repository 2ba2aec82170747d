/** What the bubble of a level says. */
export type LevelReading = 'level' | 'leftHigh' | 'rightHigh'

/** The bubble runs to the high end: this many of its own widths off the middle for each 1/16 in of rise over the level's length. */
const WIDTHS_PER_SIXTEENTH = 0.15

/** The bubble touches a line at half the gap that the two lines leave it, in bubble widths. */
const HALF_GAP = 0.1

/**
 * Where the bubble stands, in its own widths from the middle (right is positive), and what that says: level while it
 * stays between the lines. `rise` is how much higher the right end is, in sixteenths of an inch. It stops at the glass.
 */
export function readLevel(rise: number): { bubble: number, reading: LevelReading } {
  const bubble = Math.max(-1.5, Math.min(1.5, rise * WIDTHS_PER_SIXTEENTH))
  const reading = Math.abs(bubble) <= HALF_GAP ? 'level' : bubble < 0 ? 'leftHigh' : 'rightHigh'
  return { bubble, reading }
}
