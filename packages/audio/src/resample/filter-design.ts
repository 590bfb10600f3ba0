/** Zeroth-order modified Bessel function of the first kind, by its power series. */
function besselI0(x: number): number {
  let term = 1
  let sum = 1
  for (let k = 1; term > sum * 1e-17; k++) {
    term *= (x / (2 * k)) ** 2
    sum += term
  }
  return sum
}

/**
 * Kaiser's window shape for a stopband attenuation, and the length in samples that reaches it over a transition.
 * Formulae: Kaiser 1974, as printed in Oppenheim & Schafer, Discrete-Time Signal Processing, section 7.6.
 * @param transition width of the transition band as a fraction of the sample rate
 */
export function kaiserDesign(
  attenuationDb: number,
  transition: number,
): { beta: number; lengthSamples: number } {
  return {
    beta: 0.1102 * (attenuationDb - 8.7),
    lengthSamples: (attenuationDb - 7.95) / (2.285 * 2 * Math.PI * transition),
  }
}

/**
 * A Kaiser-windowed sinc, evaluated at any distance from its centre.
 * @param cutoff fraction of the sample rate (0 … 0.5)
 */
export function windowedSinc(cutoff: number, halfLengthSamples: number, beta: number): (t: number) => number {
  const scale = 1 / besselI0(beta)
  return (t) => {
    const position = t / halfLengthSamples
    if (position <= -1 || position >= 1) return 0
    const angle = 2 * Math.PI * cutoff * t
    const sinc = Math.abs(angle) < 1e-9 ? 1 : Math.sin(angle) / angle
    return 2 * cutoff * sinc * besselI0(beta * Math.sqrt(1 - position * position)) * scale
  }
}
