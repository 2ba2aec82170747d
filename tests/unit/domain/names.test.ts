import { describe, expect, it } from 'vitest'
import fc from 'fast-check'
import { compareSortNames, initialsOf, sortNameOf } from '#shared/domain/names'

describe('a name in a list', () => {
  it.each([
    ['Dario Ferro', 'Ferro, Dario'],
    ['  Dario   Ferro ', 'Ferro, Dario'],
    ['John Paul Smith', 'Smith, John Paul'],
    ['John Q. Smith', 'Smith, John Q.'],
    ['Luis Hernández López', 'Hernández López, Luis'],
    ['Ana García Ruiz', 'García Ruiz, Ana'],
    ['José Luis Ramírez', 'Ramírez, José Luis'],
    ['María José Peña Trejo', 'Peña Trejo, María José'],
    ['Rosa Peña Trejo', 'Peña Trejo, Rosa'],
    ['Ana de la Cruz', 'de la Cruz, Ana'],
    ['Luis Alberto de la Cruz Soto', 'de la Cruz Soto, Luis Alberto'],
    ['Pieter van der Berg', 'van der Berg, Pieter'],
    ['Mary-Ann Lopez-Reed', 'Lopez-Reed, Mary-Ann'],
    ['John Smith Jr.', 'Smith, John, Jr.'],
    ['John Smith, Jr.', 'Smith, John, Jr.'],
    ['Van Nguyen', 'Nguyen, Van'],
    ['Le Thi, Hoa', 'Le Thi, Hoa'],
    ['Chucho', 'Chucho'],
    ['', ''],
  ])('%j sorts as %j', (name, expected) => {
    expect(sortNameOf(name)).toBe(expected)
  })

  it('keeps every word of the name, whatever it is', () => {
    const word = fc.constantFrom('Ana', 'de', 'la', 'Cruz', 'Soto', 'Jr.', 'J.', 'van', 'Pérez', '李', 'O’Neil')
    fc.assert(fc.property(fc.array(word, { maxLength: 7 }), (words) => {
      const sorted = sortNameOf(words.join(' ')).split(/,? /).filter(part => part !== '')
      expect(sorted.sort()).toEqual([...words].sort())
    }))
  })

  it('stands where people look for it, accents or not', () => {
    const sorted = ['Zamora, Luz', 'Ávila, Rosa', 'Avila, Ana', 'Ñuñez, Beto', 'Nolan, Tom'].sort((first, second) => compareSortNames(first, second, 'es'))
    expect(sorted).toEqual(['Avila, Ana', 'Ávila, Rosa', 'Nolan, Tom', 'Ñuñez, Beto', 'Zamora, Luz'])
  })
})

describe('initials', () => {
  it.each([
    ['Dario Ferro', 'DF'], ['Luis Hernández López', 'LH'], ['Ana de la Cruz', 'AC'], ['ángel ortiz', 'ÁO'], ['Ferro, Dario', 'DF'],
    ['John Smith, Jr.', 'JS'], ['Chucho', 'C'], ['', ''], ['Tom O’Neil', 'TO'], ['"Beto" Ñuñez', 'BÑ'],
  ])('of %j are %j', (name, expected) => {
    expect(initialsOf(name)).toBe(expected)
  })
})
