/** A plain number as it is typed: decimal point, perhaps an exponent. A comma is refused rather than guessed. */
export function readNumber(text: string): { value: number; error?: undefined } | { value?: undefined; error: string } {
  const typed = text.trim().replace(/[−–]/g, '-').replace(/[\u2009\u00a0\u202f ](?=\d{3})/g, '');
  if (typed === '') return { error: 'Type a number.' };
  if (typed.includes(',')) return { error: 'Write the number with a decimal point, not a comma.' };
  if (!/^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(typed)) return { error: `"${text.trim()}" is not a number.` };
  const value = Number(typed);
  return Number.isFinite(value) ? { value } : { error: 'This number is too large.' };
}

/** A number for a text field: the digits that matter, without the noise of a conversion there and back. */
export function writeNumber(value: number): string {
  return String(Number(value.toPrecision(12)));
}
