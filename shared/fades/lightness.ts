/**
 * CIE 1976 lightness L*, 0…100, of a relative luminance Y/Yn, 0…1 (CIE 15:2004, 8.2.1): `116·∛Y − 16`, below
 * L* = 8 `903.3·Y`. The way back is `level.transfer: "cie-lightness"`.
 */
export function lightnessOf(luminance: number): number {
  return luminance > 8 / 903.3 ? 116 * Math.cbrt(luminance) - 16 : 903.3 * luminance;
}
