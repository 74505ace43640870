/** The international pound, exactly. */
export const KILOGRAMS_PER_POUND = 0.45359237
export const kilogramsFromPounds = (pounds: number): number => pounds * KILOGRAMS_PER_POUND
export const poundsFromKilograms = (kilograms: number): number => kilograms / KILOGRAMS_PER_POUND
