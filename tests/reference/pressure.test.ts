import { describe, expect, it } from 'vitest'
import { lateralPressure, riseRateOf, weightCoefficient, type PressureInput } from '#shared/domain/pressure'

const temperatures = [40, 50, 60, 70, 80, 90, 100]
/** Of equation (b) alone: a head so high that it never governs, on a wall that (b) holds for. */
const ask = (input: Partial<PressureInput>) => lateralPressure({ riseRate: 1, concreteF: 70, unitWeight: 150, kind: 'ordinary', fluidHeight: 100, placementHeight: 14, ...input }).pressure

describe('lateral pressure, ACI 347R-14 section 4.2.2 (tables of the equations before floor and ceiling)', () => {
  it.each([
    [1, [375, 330, 300, 278.6, 262.5, 250, 240]],
    [3, [825, 690, 600, 535.7, 487.5, 450, 420]],
    [5, [1275, 1050, 900, 792.9, 712.5, 650, 600]],
  ])('equation (b) at %s ft/h', (riseRate, row) => {
    for (const [index, expected] of row.entries()) expect(ask({ riseRate, concreteF: temperatures[index]! })).toBeCloseTo(Math.max(600, expected), 1)
  })

  it.each([
    [1, [1305, 1074, 920, 810, 727.5, 663.3, 612]],
    [7, [1725, 1410, 1200, 1050, 937.5, 850, 780]],
    [15, [2285, 1858, 1573.3, 1370, 1217.5, 1098.9, 1004]],
  ])('equation (c) at %s ft/h', (riseRate, row) => {
    for (const [index, expected] of row.entries()) expect(ask({ riseRate, concreteF: temperatures[index]!, placementHeight: 16 })).toBeCloseTo(expected, 1)
  })

  it.each([
    [{ fluidHeight: 4, riseRate: 3, concreteF: 50 }, 600], [{ fluidHeight: 3, riseRate: 10, concreteF: 50 }, 450], [{ fluidHeight: 8, riseRate: 4, concreteF: 70 }, 664.3],
    [{ fluidHeight: 8, riseRate: 2, concreteF: 70 }, 600], [{ fluidHeight: 9, riseRate: 6, concreteF: 40 }, 1350], [{ fluidHeight: 16, riseRate: 4, concreteF: 70 }, 930],
    [{ fluidHeight: 10, slump: 8 }, 1500],
  ])('whole case %o gives %s lb/ft²', (input, expected) => {
    expect(lateralPressure({ riseRate: 1, concreteF: 70, unitWeight: 150, kind: 'ordinary', ...input }).pressure).toBeCloseTo(expected, 1)
  })

  it('equals the worked example of the University of Florida construction course notebooks: 15 ft, 10 ft/h, 80 °F', () => {
    expect(lateralPressure({ riseRate: 10, concreteF: 80, unitWeight: 150, kind: 'ordinary', fluidHeight: 15 })).toEqual({ pressure: 1042.5, term: 'equationC' })
  })

  it('equals the trade journal\'s 8 ft of liquid concrete', () => {
    expect(lateralPressure({ riseRate: 20, concreteF: 70, unitWeight: 150, kind: 'ordinary', fluidHeight: 8 })).toEqual({ pressure: 1200, term: 'fluidHead' })
  })

  it.each([[100, 0.8448], [120, 0.9138], [145, 1], [160, 1.1034], [80, 0.8]])('unit weight %s lb/ft³ has the coefficient %s', (weight, expected) => {
    expect(weightCoefficient(weight)).toBeCloseTo(expected, 4)
  })

  it('says the same by (b) and (c) at 7 ft/h, and steps up when the placement passes 14 ft', () => {
    expect(ask({ riseRate: 6.999999, concreteF: 60 })).toBeCloseTo(ask({ riseRate: 7, concreteF: 60 }), 1)
    expect(ask({ riseRate: 4, placementHeight: 14.01 })).toBeGreaterThan(ask({ riseRate: 4, placementHeight: 14 }) + 100)
  })
})

describe('rate of rise', () => {
  it.each([
    ['US Army subcourse EN5466: 40 ft × 2 ft, 1 yd³ in 10 min', 6, 40, 24, 2.025],
    ['US Army subcourse EN5151: 92 ft × 12 in, 405 ft³/h', 15, 92, 12, 4.402],
    ['8 in core, 120 ft, 20 yd³/h', 20, 120, 8, 6.75],
    ['12 in core, 40 ft, 5 yd³/h', 5, 40, 12, 3.375],
  ])('%s', (_name, yards, length, core, expected) => {
    expect(riseRateOf(yards, length, core)).toBeCloseTo(expected, 3)
  })
})
