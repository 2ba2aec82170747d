/** The first letters of the first and the last word of a name, each with a point: "Inés Quispe" is "I. Q."; one word gives one letter. */
export function initialsOf(name: string): string {
  const words = name.trim().split(/\s+/).filter(word => /\p{L}/u.test(word))
  const ends = words.length > 1 ? [words[0]!, words.at(-1)!] : words
  return ends.map(word => `${/\p{L}/u.exec(word)![0].toUpperCase()}.`).join(' ')
}
