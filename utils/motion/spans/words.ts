/** Sentences about spans and joints. */
import { measured } from '../findings'

/** A sentence that follows a colon. */
export function oneCaseDown(sentence: string): string {
  return sentence.charAt(0).toLowerCase() + sentence.slice(1)
}

/** "4.0": tenths from one up, hundredths below, so that two speeds that differ look different. */
function speed(value: number): string {
  const size = Math.abs(value)
  const text = size.toFixed(size >= 100 ? 0 : size >= 1 ? 1 : 2)
  return value < 0 && Number(text) !== 0 ? `−${text}` : text
}

/** "from 4.0 to 9.6 px per frame"; signs only where the motion turns. */
function speeds(before: number, after: number, unit: string): string {
  const turns = before * after < 0
  const from = turns ? before : Math.abs(before)
  const to = turns ? after : Math.abs(after)
  return `from ${speed(from)} to ${speed(to)}${unit === 'deg' ? '°' : ` ${unit}`} per frame`
}

export function speedJumps(frame: number, before: number, after: number, unit: string): string {
  return `At frame ${frame} the speed jumps ${speeds(before, after, unit)}: nothing there says contact.`
}

export function spansApart(frame: number, apart: number, unit: string): string {
  return `At frame ${frame} the spans don’t meet: their lines lie ${measured(apart, unit)} apart.`
}

export function wayTurns(frame: number, degrees: number): string {
  return `At frame ${frame} the motion turns off by ${Math.round(degrees)}° at once: nothing there says contact.`
}
