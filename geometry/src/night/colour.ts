/**
 * Colour of lamps and of sRGB pixels. Light is carried as linear sRGB, with 1 for white, in which adding is what
 * light does.
 */

export type Rgb = readonly [number, number, number];

/** White balance of the camera: light of this temperature is shown as white, so that 2700 K is warm. */
export const CAMERA_KELVIN = 4000;

/** Shares of red, green and blue in luminance (IEC 61966-2-1). */
export const LUMA: Rgb = [0.2126, 0.7152, 0.0722];

/** Where the approximation of the Planckian locus holds. */
const LEAST_KELVIN = 1667;
const MOST_KELVIN = 25_000;

/**
 * CIE 1931 chromaticity of a black body, by the cubic approximation of Kim et al. ("Design of advanced color
 * temperature control system for HDTV applications", J. Korean Physical Society 41, 2002); from 1667 to 25,000 K,
 * outside of which the end is taken.
 */
export function chromaticityOf(kelvin: number): { x: number; y: number } {
  const t = Math.min(Math.max(kelvin, LEAST_KELVIN), MOST_KELVIN);
  const k = 1e3 / t;
  const x =
    t <= 4000
      ? ((-0.2661239 * k - 0.234358) * k + 0.8776956) * k + 0.17991
      : ((-3.0258469 * k + 2.1070379) * k + 0.2226347) * k + 0.24039;
  const y =
    t <= 2222
      ? ((-1.1063814 * x - 1.3481102) * x + 2.18555832) * x - 0.20219683
      : t <= 4000
        ? ((-0.9549476 * x - 1.37418593) * x + 2.09137015) * x - 0.16748867
        : ((3.081758 * x - 5.8733867) * x + 3.75112997) * x - 0.37001483;
  return { x, y };
}

/** Bradford's sharpened cone responses of XYZ (Lam 1985; as used by ICC profiles). */
const BRADFORD: readonly Rgb[] = [
  [0.8951, 0.2664, -0.1614],
  [-0.7502, 1.7135, 0.0367],
  [0.0389, -0.0685, 1.0296],
];
const FROM_BRADFORD: readonly Rgb[] = [
  [0.9869929, -0.1470543, 0.1599627],
  [0.4323053, 0.5183603, 0.0492912],
  [-0.0085287, 0.0400428, 0.9684867],
];
/** XYZ to linear sRGB (IEC 61966-2-1). */
const TO_SRGB: readonly Rgb[] = [
  [3.2404542, -1.5371385, -0.4985314],
  [-0.969266, 1.8760108, 0.041556],
  [0.0556434, -0.2040259, 1.0572252],
];
const D65: Rgb = [0.95047, 1, 1.08883];

/** Light of one unit of luminance and this colour temperature, as the camera sees it: linear sRGB. */
export function lampColour(kelvin: number): Rgb {
  const seen = times(BRADFORD, whiteXyz(kelvin));
  const balanced = times(BRADFORD, whiteXyz(CAMERA_KELVIN));
  const white = times(BRADFORD, D65);
  const [r, g, b] = times(
    TO_SRGB,
    times(FROM_BRADFORD, [
      (seen[0] * white[0]) / balanced[0],
      (seen[1] * white[1]) / balanced[1],
      (seen[2] * white[2]) / balanced[2],
    ]),
  );
  const inside: Rgb = [Math.max(r, 0), Math.max(g, 0), Math.max(b, 0)];
  const luminance = inside[0] * LUMA[0] + inside[1] * LUMA[1] + inside[2] * LUMA[2];
  return [inside[0] / luminance, inside[1] / luminance, inside[2] / luminance];
}

function whiteXyz(kelvin: number): Rgb {
  const { x, y } = chromaticityOf(kelvin);
  return [x / y, 1, (1 - x - y) / y];
}

function times(m: readonly Rgb[], v: Rgb): Rgb {
  const row = (r: Rgb) => r[0] * v[0] + r[1] * v[1] + r[2] * v[2];
  return [row(m[0]!), row(m[1]!), row(m[2]!)];
}

/** Linear light of an sRGB value, both 0 to 1 (IEC 61966-2-1). */
export const linearOf = (encoded: number): number =>
  encoded <= 0.04045 ? encoded / 12.92 : ((encoded + 0.055) / 1.055) ** 2.4;

/** The sRGB value of linear light, both 0 to 1 (IEC 61966-2-1). */
export const encodedOf = (linear: number): number =>
  linear <= 0.0031308 ? linear * 12.92 : 1.055 * linear ** (1 / 2.4) - 0.055;
