/** autocannon ships no types; these are the parts that the benchmarks use. */
declare module 'autocannon' {
  interface Options {
    url: string
    headers?: Record<string, string>
    connections?: number
    /** Seconds. */
    duration?: number
    /** Requests in all, instead of a duration. */
    amount?: number
  }
  interface Result {
    requests: { average: number }
    non2xx: number
    errors: number
  }
  export default function autocannon(options: Options): Promise<Result>
}
