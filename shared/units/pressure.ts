/** 1 psi = 0.45359237 kg × 9.80665 m/s² / (0.0254 m)² exactly (NIST SP 811 appendix B). */
export const KILOPASCAL_PER_PSI = 6.894757293168
export const KILOPASCAL_PER_BAR = 100
/** One standard atmosphere in kilopascal, exactly; real barometers differ by some kilopascal, and by far more with altitude. */
export const STANDARD_ATMOSPHERE_KILOPASCAL = 101.325

export const psiFromKilopascal = (kilopascal: number): number => kilopascal / KILOPASCAL_PER_PSI
export const kilopascalFromPsi = (psi: number): number => psi * KILOPASCAL_PER_PSI
export const barFromKilopascal = (kilopascal: number): number => kilopascal / KILOPASCAL_PER_BAR
export const kilopascalFromBar = (bar: number): number => bar * KILOPASCAL_PER_BAR

/** Absolute pressure from a gauge reading and the barometer, all in kilopascal. */
export const absoluteFromGauge = ({ gaugeKilopascal, barometricKilopascal }: { gaugeKilopascal: number, barometricKilopascal: number }): number => gaugeKilopascal + barometricKilopascal
/** Gauge reading from an absolute pressure and the barometer, all in kilopascal. */
export const gaugeFromAbsolute = ({ kilopascalAbsolute, barometricKilopascal }: { kilopascalAbsolute: number, barometricKilopascal: number }): number => kilopascalAbsolute - barometricKilopascal
