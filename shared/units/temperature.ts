/** °F = 1.8 °C + 32, exactly. */
export const fahrenheitFromCelsius = (celsius: number): number => celsius * 1.8 + 32
export const celsiusFromFahrenheit = (fahrenheit: number): number => (fahrenheit - 32) / 1.8
export const kelvinFromCelsius = (celsius: number): number => celsius + 273.15
