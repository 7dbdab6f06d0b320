/** Pure: devices state their cell constant with four or five digits; half a unit of the fourth is at most 0.05 %. */
const tolerance = 0.0005;

export const isSameConstant = (onePerCm: number, otherPerCm: number): boolean =>
  Math.abs(onePerCm - otherPerCm) <= tolerance * otherPerCm;
