/** When a bounce touches the ground: every hop lasts e times as long as the one before it. */

/** Hops done by `time` after the first contact, the first one lasting `hop`; Infinity once at rest. Any unit of time. */
export function hopsBy(time: number, hop: number, e: number): number {
  if (e === 1) return Math.floor(time / hop)
  const left = 1 - time * (1 - e) / hop
  return left > 1e-12 ? Math.max(0, Math.floor(Math.log(left) / Math.log(e))) : Infinity
}

/** From the first contact to the one after `k` hops: hop·(1 − eᵏ)/(1 − e), the geometric series. */
export function contactAfter(k: number, hop: number, e: number): number {
  return e === 1 ? hop * k : hop * (1 - e ** k) / (1 - e)
}
