/** Round flows from thin to thick, the largest near the plant's own, for legends. */
export function flowMarks(largest: number): number[] {
  const marks = [round(largest / 24), round(largest / 4), round(largest)]
  return marks.filter((mark, i) => mark > 0 && marks.indexOf(mark) === i)
}

/** To the first or second digit, never above what it was. */
function round(value: number): number {
  if (!(value > 0)) return 0
  const scale = 10 ** Math.floor(Math.log10(value))
  const steps = [1, 1.2, 1.5, 2, 2.5, 3, 4, 5, 6, 8]
  return (steps.filter((step) => step * scale <= value * (1 + 1e-9)).at(-1) ?? 1) * scale
}
