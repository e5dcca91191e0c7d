/**
 * Which way along the path each drawing goes. A swing that comes back, a ball that goes up and down again and a wheel that turns
 * more than once would draw over themselves; each pass gets a lane of its own.
 */

/**
 * Number of the pass (0, 1, …) of each reading. A pass ends where the motion has turned back by more than `slack`, or where it
 * has gone on for `longest` reading units (a full turn).
 */
export function passesOf(readings: readonly number[], slack: number, longest = Number.POSITIVE_INFINITY): number[] {
  const passes: number[] = []
  let pass = 0
  let direction = 0
  let start = 0
  let furthest = 0
  for (let i = 0; i < readings.length; i++) {
    const reading = readings[i]!
    if (i > 0) {
      const best = readings[furthest]!
      if (direction === 0) {
        if (Math.abs(reading - readings[start]!) > slack) direction = Math.sign(reading - readings[start]!)
        if (direction !== 0) furthest = i
      } else if ((reading - best) * direction >= 0) {
        furthest = i
      } else if ((best - reading) * direction > slack) {
        // It turned at the furthest drawing; those after it already belong to the way back.
        pass++
        for (let j = furthest + 1; j < i; j++) passes[j] = pass
        direction = -direction
        start = furthest
        furthest = i
      }
      if (Math.abs(reading - readings[start]!) >= longest) {
        pass++
        start = i
        furthest = i
      }
    }
    passes.push(pass)
  }
  return passes
}

/** Runs of neighbours for which `is` says yes, as [first, last] positions. */
export function runsOf<T>(list: readonly T[], is: (item: T) => boolean): [number, number][] {
  const runs: [number, number][] = []
  list.forEach((item, i) => {
    if (!is(item)) return
    const open = runs.at(-1)
    if (open && open[1] === i - 1) open[1] = i
    else runs.push([i, i])
  })
  return runs
}
