/** How far a computed value is from a printed one, as a fraction of the printed one. */
export const relativeError = (computed: number, printed: number): number => Math.abs(computed / printed - 1);

/** Half a unit of the last digit a value is printed with: what agreement "to every printed digit" means. */
export const halfDigit = (printed: string): number => {
  const [mantissa = '', exponent = '0'] = printed.toLowerCase().split('e');
  const decimals = (mantissa.split('.')[1] ?? '').length;
  return 0.5 * 10 ** (Number(exponent) - decimals) * (1 + 1e-9);
};
