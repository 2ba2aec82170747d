/** How one course lies on the one below. Lengths in inches. */
export interface CourseFit {
  /** The shorter distance from a joint to the nearest joint below. 0: a continuous joint. */
  overlap: number
  isStacked: boolean
  /** The overlap reaches the form maker's least. */
  isEnough: boolean
  /** Every tie stands over a tie below. */
  areTiesInLine: boolean
}

/**
 * How a course shifted by `offset` lies on one of the same blocks. The least overlap is the form maker's number and is
 * asked for, never assumed. Ties line up when the shift is a whole number of tie spacings (common practice).
 */
export function courseFit({ offset, blockLength, tieSpacing, leastOverlap }: { offset: number, blockLength: number, tieSpacing: number, leastOverlap: number }): CourseFit {
  const shift = ((offset % blockLength) + blockLength) % blockLength
  const overlap = Math.min(shift, blockLength - shift)
  return { overlap, isStacked: overlap === 0, isEnough: overlap > 0 && overlap >= leastOverlap, areTiesInLine: shift % tieSpacing === 0 }
}
