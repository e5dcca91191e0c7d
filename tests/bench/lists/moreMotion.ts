/** Motions of the laws beyond the first four, reading per whole frame: school algebra from contact to contact, and odex for the drag. */
import { GRAVITY } from './motion'
import { Solver } from './odex'

/** E − (1 − m)K by the arithmetic-geometric mean (Abramowitz & Stegun 17.6): the mean of θ′² over a swing is 4k² of it over K. */
function swept(m: number): number {
  let [a, b, c, sum, power] = [1, Math.sqrt(1 - m), Math.sqrt(m), m / 2, 1]
  while (c > 1e-15) {
    ;[a, b, c] = [(a + b) / 2, Math.sqrt(a * b), (a - b) / 2]
    sum += power * c * c
    power *= 2
  }
  const k = Math.PI / (2 * a)
  return k * (1 - sum) - (1 - m) * k
}

/**
 * θ″ = −k² sin θ − 2γθ′, radians at every whole frame. In air γ is constant: a small swing falls by e^(−δ), a wide one by more. Otherwise
 * γ follows the amplitude A so that every swing falls by e^(−δ): dm/dt = −4γ(E − m₁K)/K on the mean, and a swing takes 4K/k.
 */
export function dragged(
  kSquared: number, decrement: number, air: boolean, start: number, turn: number, fps: number, frames: number,
): number[] {
  const k = Math.sqrt(kSquared)
  const gammaAt = (angle: number, speed: number) => {
    const m = Math.sin(angle / 2) ** 2 + (speed / (2 * k)) ** 2
    if (air || m < 1e-9) return decrement * k / (2 * Math.PI)
    const amplitude = 2 * Math.asin(Math.sqrt(m))
    return decrement * k * amplitude * Math.sin(amplitude) / (32 * swept(m))
  }
  const solver = new Solver(2)
  solver.absoluteTolerance = 1e-10
  solver.relativeTolerance = 1e-10
  solver.initialStepSize = 1 / fps
  const field = (_t: number, y: number[]) => [y[1] as number, -kSquared * Math.sin(y[0] as number) - 2 * gammaAt(y[0] as number, y[1] as number) * (y[1] as number)]
  const out = [start]
  let y = [start, turn]
  for (let frame = 1; frame <= frames; frame++) {
    y = solver.solve(field, 0, y, 1 / fps).y
    out.push(y[0] as number)
  }
  return out
}

/**
 * Heights over the ground, metres, at every whole frame of a ball at height `height` with upward speed `speed`, until `frames`; and the
 * frames of its contacts, whole or not. Flies from contact to contact; below a thousandth of a second a hop counts as rest.
 */
export function bounced(
  height: number, speed: number, restitution: number, fps: number, frames: number,
): { heights: number[], contacts: number[] } {
  const heights: number[] = []
  const contacts: number[] = []
  let [at, h, v] = [0, height, speed]
  const landing = () => at + (v + Math.sqrt(v * v + 2 * GRAVITY * h)) / GRAVITY
  let next = landing()
  for (let frame = 0; frame <= frames; frame++) {
    const time = frame / fps
    while (time >= next && v >= 0.005 - 1e9 * Number(contacts.length === 0)) {
      v = restitution * Math.sqrt(v * v + 2 * GRAVITY * h)
      contacts.push(next * fps)
      at = next
      h = 0
      next = landing()
    }
    const t = time - at
    heights.push(contacts.length > 0 && v < 0.005 ? 0 : Math.max(0, h + v * t - GRAVITY * t * t / 2))
  }
  return { heights, contacts }
}
