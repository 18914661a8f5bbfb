/** Linear light, 0 to 1, of an 8-bit sRGB code (IEC 61966-2-1). */
export function linearOf(code: number): number {
  const value = code / 255;
  return value <= 0.04045 ? value / 12.92 : ((value + 0.055) / 1.055) ** 2.4;
}
