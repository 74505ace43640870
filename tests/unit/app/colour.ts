/** Colour arithmetic for the tests of the tokens; linear RGB channels run from 0 to 1. */
export type LinearRgb = readonly [number, number, number]

/** sRGB to linear light, IEC 61966-2-1. @param hex `#RRGGBB` */
export function linearRgb(hex: string): LinearRgb {
  const channel = (start: number) => {
    const value = Number.parseInt(hex.slice(start, start + 2), 16) / 255
    return value <= 0.04045 ? value / 12.92 : ((value + 0.055) / 1.055) ** 2.4
  }
  return [channel(1), channel(3), channel(5)]
}

/** Relative luminance, WCAG 2.2. */
export function luminance([red, green, blue]: LinearRgb): number {
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue
}

/** Contrast ratio, WCAG 2.2: 1 to 21. */
export function contrast(one: string, other: string): number {
  const [dark, light] = [luminance(linearRgb(one)), luminance(linearRgb(other))].sort((a, b) => a - b) as [number, number]
  return (light + 0.05) / (dark + 0.05)
}

/**
 * Severity 1.0 of G. M. Machado, M. M. Oliveira, L. A. F. Fernandes, "A Physiologically-based Model for
 * Simulation of Color Vision Deficiency", IEEE Trans. Visualization and Computer Graphics 15(6), 2009.
 */
export const VISIONS = {
  usual: [[1, 0, 0], [0, 1, 0], [0, 0, 1]],
  protanopia: [[0.152286, 1.052583, -0.204868], [0.114503, 0.786281, 0.099216], [-0.003882, -0.048116, 1.051998]],
  deuteranopia: [[0.367322, 0.860646, -0.227968], [0.280085, 0.672501, 0.047413], [-0.01182, 0.04294, 0.968881]],
  tritanopia: [[1.255528, -0.076749, -0.178779], [-0.078411, 0.930809, 0.147602], [0.004733, 0.691367, 0.3039]],
} as const

export function seenWith(vision: keyof typeof VISIONS, [red, green, blue]: LinearRgb): LinearRgb {
  const [r, g, b] = VISIONS[vision].map(([x, y, z]) => Math.min(1, Math.max(0, x * red + y * green + z * blue)))
  return [r!, g!, b!]
}

/** CIE 1976 L*a*b* under D65 (CIE 15; matrix of IEC 61966-2-1). */
function lab([red, green, blue]: LinearRgb): [number, number, number] {
  const curve = (t: number) => t > 216 / 24389 ? Math.cbrt(t) : ((24389 / 27) * t + 16) / 116
  const x = curve((0.4124564 * red + 0.3575761 * green + 0.1804375 * blue) / 0.95047)
  const y = curve(0.2126729 * red + 0.7151522 * green + 0.072175 * blue)
  const z = curve((0.0193339 * red + 0.119192 * green + 0.9503041 * blue) / 1.08883)
  return [116 * y - 16, 500 * (x - y), 200 * (y - z)]
}

/** CIE 1976 colour difference ΔE*ab; about 2.3 is just noticeable. */
export function difference(one: LinearRgb, other: LinearRgb): number {
  const [a, b] = [lab(one), lab(other)]
  return Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2])
}
