// erfc by the rational approximations of W. J. Cody, "Rational Chebyshev approximations for the error
// function", Math. Comp. 23 (1969) 631–637; a test holds it against the incomplete gamma function.
const A = [3.16112374387056560, 1.13864154151050156e2, 3.77485237685302021e2, 3.20937758913846947e3, 1.85777706184603153e-1]
const B = [2.36012909523441209e1, 2.44024637934444173e2, 1.28261652607737228e3, 2.84423683343917062e3]
const C = [5.64188496988670089e-1, 8.88314979438837594, 6.61191906371416295e1, 2.98635138197400131e2, 8.81952221241769090e2, 1.71204761263407058e3, 2.05107837782607147e3, 1.23033935479799725e3, 2.15311535474403846e-8]
const D = [1.57449261107098347e1, 1.17693950891312499e2, 5.37181101862009858e2, 1.62138957456669019e3, 3.29079923573345963e3, 4.36261909014324716e3, 3.43936767414372164e3, 1.23033935480374942e3]
const P = [3.05326634961232344e-1, 3.60344899949804439e-1, 1.25781726111229246e-1, 1.60837851487422766e-2, 6.58749161529837803e-4, 1.63153871373020978e-2]
const Q = [2.56852019228982242, 1.87295284992346725, 5.27905102951428412e-1, 6.05183413124413191e-2, 2.33520497626869185e-3]
const ONE_OVER_ROOT_PI = 5.6418958354775628695e-1

/** exp(−y²) without the loss of digits of squaring first. */
function gaussian(y: number): number {
  const coarse = Math.trunc(y * 16) / 16
  return Math.exp(-coarse * coarse) * Math.exp(-(y - coarse) * (y + coarse))
}

function erfSmall(x: number): number {
  const square = x * x
  let top = A[4]! * square
  let bottom = square
  for (let i = 0; i < 3; i++) {
    top = (top + A[i]!) * square
    bottom = (bottom + B[i]!) * square
  }
  return x * (top + A[3]!) / (bottom + B[3]!)
}

/** erfc for y ≥ 0.46875. */
function erfcLarge(y: number): number {
  if (y > 26.543) return 0
  if (y <= 4) {
    let top = C[8]! * y
    let bottom = y
    for (let i = 0; i < 7; i++) {
      top = (top + C[i]!) * y
      bottom = (bottom + D[i]!) * y
    }
    return gaussian(y) * (top + C[7]!) / (bottom + D[7]!)
  }
  const square = 1 / (y * y)
  let top = P[5]! * square
  let bottom = square
  for (let i = 0; i < 4; i++) {
    top = (top + P[i]!) * square
    bottom = (bottom + Q[i]!) * square
  }
  const ratio = square * (top + P[4]!) / (bottom + Q[4]!)
  return gaussian(y) * (ONE_OVER_ROOT_PI - ratio) / y
}

/** Complementary error function; relative error about 1e-16, also far out. */
export function erfc(x: number): number {
  const y = Math.abs(x)
  if (y <= 0.46875) return 1 - erfSmall(x)
  return x < 0 ? 2 - erfcLarge(y) : erfcLarge(y)
}

/** Φ(z): probability that a standard normal variable lies at or below z; keeps its digits in the lower tail. */
export function normalCdf(z: number): number {
  return erfc(-z / Math.SQRT2) / 2
}

/** 1 − Φ(z), with its digits in the upper tail. */
export function normalUpper(z: number): number {
  return erfc(z / Math.SQRT2) / 2
}

/** φ(z): density of the standard normal distribution. */
export function normalDensity(z: number): number {
  return Math.exp(-z * z / 2) / Math.sqrt(2 * Math.PI)
}

/**
 * z with Φ(z) = p, for 0 < p < 1. A coarse start (Abramowitz & Stegun 26.2.23, error below 4.5e-4), then
 * Halley's method on Φ in the tail that holds p.
 *
 * @throws RangeError outside 0 < p < 1.
 */
export function normalQuantile(p: number): number {
  if (!(p > 0 && p < 1)) throw new RangeError(`A probability must lie between 0 and 1, not ${p}`)
  if (p === 0.5) return 0
  const tail = Math.min(p, 1 - p)
  const t = Math.sqrt(-2 * Math.log(tail))
  let z = t - (2.515517 + 0.802853 * t + 0.010328 * t * t) / (1 + 1.432788 * t + 0.189269 * t * t + 0.001308 * t ** 3)
  for (let i = 0; i < 4; i++) {
    const step = (normalUpper(z) - tail) / normalDensity(z)
    z += step / (1 - z * step / 2)
  }
  return p < 0.5 ? -z : z
}
