/** A drawn signature as an SVG, from strokes of points between 0 and 1; 3 to 1 like the field it was drawn in. */
export function signatureSvg(strokes: readonly (readonly (readonly [number, number])[])[]): string {
  const at = ([x, y]: readonly [number, number]) => `${(x * 300).toFixed(1)} ${(y * 100).toFixed(1)}`
  const path = strokes.map(([first, ...rest]) => (first ? `M${at(first)}${rest.length > 0 ? rest.map(point => `L${at(point)}`).join('') : `L${at(first)}`}` : '')).join('')
  return `<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 300 100"><path d="${path}" fill="none" stroke="#000" stroke-width="4" stroke-linecap="round" stroke-linejoin="round"/></svg>`
}
