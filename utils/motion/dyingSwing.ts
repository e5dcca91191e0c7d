/**
 * A pendulum that loses the same share of its amplitude over every full swing. At any moment it moves as an undamped pendulum of the
 * amplitude it then has, and the amplitude A falls as e^(−δN), N counting full swings: first-order averaging (N. M. Krylov,
 * N. N. Bogoliubov, 1937; memory), exact for small swings but for a shift of k by δ²/8π² of itself. tests/outside states its error.
 *
 * Undamped, with q the nome of m = sin²(A/2) and p counting full swings from hanging on the way up:
 *   θ = 8 Σ q^(n/2)/(n(1 + qⁿ)) · sin(2πnp), n odd; a full swing takes 4K/k, 4K = 2π(1 + 2q + 2q⁴ + 2q⁹ + …)².
 * From DLMF 22.11.1 to 22.11.3 (θ/2 = asin(√m·sn), term by term) and 20.9.2 with 19.8.5. The sums need no more than a sine and a
 * cosine per drawing.
 */

/** Radians. Beyond it a swing hangs about the top, and nobody's swing dies from there. */
export const WIDEST_SWING = 165 * Math.PI / 180

const FULL = 2 * Math.PI

/** q and dq/dA. q = ε + 2ε⁵ + 15ε⁹ + 150ε¹³ + 1707ε¹⁷ …, ε = ½(1 − √k′)/(1 + √k′), k′ = cos(A/2): DLMF 19.5.6, A&S 17.3.21. */
function nomeOf(amplitude: number): { q: number, slope: number } {
  const root = Math.sqrt(Math.cos(amplitude / 2))
  // 1 − √k′ without cancelling: 1 − k′ = 2 sin²(A/4).
  const part = Math.sin(amplitude / 4) / (1 + root)
  const eps = part * part
  const e2 = eps * eps
  const e4 = e2 * e2
  const q = eps * (1 + e4 * (2 + e4 * (15 + e4 * (150 + e4 * 1707))))
  const byEps = 1 + e4 * (10 + e4 * (135 + e4 * (1950 + e4 * 29019)))
  const slope = byEps * Math.sin(amplitude / 2) / (4 * root * (1 + root) * (1 + root))
  return { q, slope }
}

/** 4K, the full swing's length in τ = kt. */
function swingOf(q: number): number {
  const q4 = q * q * q * q
  const theta = 1 + 2 * (q + q4 * (1 + q * q4 + q4 * q4 * q4))
  return FULL * theta * theta
}

/** ∫₀ᴬ (4K − 2π)/a da on an even grid, with its slope: what a swing from A loses on the small one by the time it has died. */
const CELLS = 400
let lag: { value: Float64Array, slope: Float64Array } | null = null

function lagTable(): { value: Float64Array, slope: Float64Array } {
  if (lag) return lag
  const step = WIDEST_SWING / CELLS
  const slopeAt = (a: number) => (a === 0 ? 0 : (swingOf(nomeOf(a).q) - FULL) / a)
  const value = new Float64Array(CELLS + 1)
  const slope = new Float64Array(CELLS + 1)
  for (let i = 1; i <= CELLS; i++) {
    const [from, to] = [(i - 1) * step, i * step]
    slope[i] = slopeAt(to)
    // Boole's rule (A&S 25.4.14).
    const inner = 32 * slopeAt(from + step / 4) + 12 * slopeAt(from + step / 2) + 32 * slopeAt(to - step / 4)
    value[i] = (value[i - 1] as number) + step / 90 * (7 * (slope[i - 1] as number) + inner + 7 * (slope[i] as number))
  }
  lag = { value, slope }
  return lag
}

function lagOf(amplitude: number): number {
  const { value, slope } = lagTable()
  const step = WIDEST_SWING / CELLS
  if (amplitude >= WIDEST_SWING) {
    return (value[CELLS] as number) + (slope[CELLS] as number) * WIDEST_SWING * Math.log(amplitude / WIDEST_SWING)
  }
  const cell = Math.floor(amplitude / step)
  const u = amplitude / step - cell
  const [v0, v1] = [value[cell] as number, value[cell + 1] as number]
  const [s0, s1] = [slope[cell] as number * step, slope[cell + 1] as number * step]
  return v0 + u * (s0 + u * (3 * (v1 - v0) - 2 * s0 - s1 + u * (2 * (v0 - v1) + s0 + s1)))
}

let started = { amplitude: NaN, lag: 0, swing: FULL }

/** One moment of a dying swing; angles in radians, swings counted whole. */
export interface Moment {
  angle: number
  /** dθ/dτ. */
  rate: number
  /** d angle / d amplitude at the start, d angle / d phase, d angle / d decrement. */
  byAmplitude: number
  byPhase: number
  byDecrement: number
  /** Full swings since the start. */
  swings: number
  /** τ of a full swing of the amplitude it now has. */
  swing: number
}

/**
 * Fills `moment` for τ = kt after the start. `amplitude`: at the start, above 0; `phase`: full swings past hanging on the way up, at the
 * start; `decrement` δ > 0: the amplitude falls by e^(−δ) per full swing; `guess`: swings done by then, or thereabouts.
 */
export function dyingSwing(tau: number, amplitude: number, phase: number, decrement: number, guess: number, moment: Moment): void {
  // A line is traced drawing by drawing from the same start.
  if (started.amplitude !== amplitude) {
    started = { amplitude, lag: lagOf(amplitude), swing: fullSwing(Math.min(WIDEST_SWING, amplitude)) }
  }
  const { lag: lagAtStart, swing: swing0 } = started
  // τ = 2πN + (lag(A₀) − lag(A₀e^(−δN)))/δ has one answer N: the right side grows by 4K(A) per swing.
  let swings = guess
  let now = amplitude * Math.exp(-decrement * swings)
  let nome = nomeOf(Math.min(WIDEST_SWING, now))
  let swing = swingOf(nome.q)
  let behind = (lagAtStart - lagOf(now)) / decrement
  for (let round = 0; round < 30; round++) {
    const miss = tau - FULL * swings - behind
    if (Math.abs(miss) < 1e-12 * (1 + Math.abs(tau))) break
    swings += miss / swing
    now = amplitude * Math.exp(-decrement * swings)
    nome = nomeOf(Math.min(WIDEST_SWING, now))
    swing = swingOf(nome.q)
    behind = (lagAtStart - lagOf(now)) / decrement
  }
  const { q, slope } = nome
  const turn = FULL * (phase + swings)
  const sin1 = Math.sin(turn)
  const cos1 = Math.cos(turn)
  const twice = 2 * cos1 * cos1 - 1
  // sin and cos of n·turn for odd n, two back and one back: f(n+2) = 2cos(2·turn)·f(n) − f(n−2).
  let [sinBack, cosBack, sin, cos] = [-sin1, cos1, sin1, cos1]
  let power = Math.sqrt(q)
  let whole = q
  let [angle, byTurn, byNome] = [0, 0, 0]
  for (let n = 1; n < 80; n += 2) {
    const share = power / (1 + whole)
    angle += share / n * sin
    byTurn += share * cos
    byNome += power * (1 - whole) / ((1 + whole) * (1 + whole)) * sin
    if (power < 1e-13) break
    const [sinNext, cosNext] = [2 * twice * sin - sinBack, 2 * twice * cos - cosBack]
    sinBack = sin
    cosBack = cos
    sin = sinNext
    cos = cosNext
    power *= q
    whole *= q * q
  }
  // The number of terms never shows: they shrink by q each.
  const bySwings = 8 * FULL * byTurn
  const byNow = q > 0 && now < WIDEST_SWING ? 4 * byNome / q * slope : 0
  const swingsByStart = -(swing0 - swing) / (amplitude * decrement * swing)
  const swingsByDecrement = (behind - (swing - FULL) * swings) / (decrement * swing)
  moment.angle = 8 * angle
  moment.swings = swings
  moment.swing = swing
  moment.rate = (bySwings - byNow * decrement * now) / swing
  moment.byPhase = bySwings
  moment.byAmplitude = bySwings * swingsByStart + byNow * now * (1 / amplitude - decrement * swingsByStart)
  moment.byDecrement = bySwings * swingsByDecrement - byNow * now * (swings + decrement * swingsByDecrement)
}

/** Phase at which a dying swing of this amplitude stands still, full swings: a little before the quarter. */
export function stillPhase(amplitude: number, decrement: number): number {
  // There θ″ = −sin A·(4K)² per swing², and the amplitude goes by δA.
  const swing = swingOf(nomeOf(amplitude).q)
  return 0.25 - decrement * amplitude / (Math.sin(amplitude) * swing * swing)
}

/** τ of a full swing of this amplitude, undamped: 4K. */
export const fullSwing = (amplitude: number) => swingOf(nomeOf(amplitude).q)

/** τ that `swings` full swings from this amplitude take: 2πN + (lag(A₀) − lag(A₀e^(−δN)))/δ. */
export function swingsTake(swings: number, amplitude: number, decrement: number): number {
  return FULL * swings + (lagOf(amplitude) - lagOf(amplitude * Math.exp(-decrement * swings))) / decrement
}
