import { plainIssues } from '~/utils/contracts/issues'
import { newSequence, newShot, shotChange } from '~/utils/contracts/production'
import type { Production } from '~/utils/contracts/production'
import type { ShotFacts } from '~/utils/contracts/take'
import { dayInWords } from '~/utils/drawing/words'
import { readNumber } from '~/utils/pasting'

/** The shot form: every field as text. `sequence` is `new` while one is being made. */
export interface ShotForm {
  code: string
  title: string
  sequence: string
  newSequence: { code: string; title: string }
  firstFrame: string
  lastFrame: string
  fps: string
  brief: string
  position: string
  dueOn: string
  animator: string
  supervisor: string
}

export function emptyShotForm(production: Production, sequence?: string): ShotForm {
  const known = production.sequences.some(({ code }) => code === sequence)
  return {
    code: '', title: '', brief: '', position: '', dueOn: '', animator: '', supervisor: '', firstFrame: '1', lastFrame: '', fps: '24',
    sequence: known ? sequence! : (production.sequences.at(-1)?.code ?? 'new'),
    newSequence: { code: '', title: '' },
  }
}
export function shotFormOf(facts: ShotFacts): ShotForm {
  return {
    code: facts.code,
    title: facts.title,
    sequence: facts.sequence.code,
    newSequence: { code: '', title: '' },
    firstFrame: String(facts.firstFrame),
    lastFrame: String(facts.lastFrame),
    fps: String(facts.fps),
    brief: facts.brief,
    position: String(facts.position),
    dueOn: facts.dueOn ?? '',
    animator: facts.animator?.id ?? '',
    supervisor: facts.supervisor?.id ?? '',
  }
}

/** A frame is typed as a whole number, a rate may have a comma; what isn't a number is told as such by the schema. */
const number = (text: string) => (text.trim() === '' ? undefined : (readNumber(text) ?? Number.NaN))

function fieldsOf(form: ShotForm) {
  return {
    title: form.title,
    sequence: form.sequence === 'new' ? form.newSequence.code.toUpperCase().trim() : form.sequence,
    firstFrame: number(form.firstFrame),
    lastFrame: number(form.lastFrame),
    fps: number(form.fps),
    brief: form.brief,
    dueOn: form.dueOn || null,
    animator: form.animator || null,
    supervisor: form.supervisor || null,
  }
}

type Read<T> = { body: T; complaints: null } | { body: null; complaints: Record<string, string> }

function read<T>(schema: { safeParse: (value: unknown) => { success: true; data: T } | { success: false; error: { issues: Parameters<typeof plainIssues>[0] } } }, value: unknown): Read<T> {
  const result = schema.safeParse(value)
  if (result.success) return { body: result.data, complaints: null }
  const complaints: Record<string, string> = {}
  for (const { path, message } of plainIssues(result.error.issues)) complaints[path] ??= message
  return { body: null, complaints }
}

/** The body of a new shot, or what is wrong by field. */
export function readNewShot(form: ShotForm, clientId: string) {
  const position = number(form.position)
  return read(newShot, { clientId, code: form.code.toUpperCase().trim(), ...fieldsOf(form), ...(position === undefined ? {} : { position }) })
}

/** Only what differs from the shot that was opened: a field that nobody touched never overwrites what somebody else wrote. */
export function readShotChange(form: ShotForm, opened: ShotForm, version: number) {
  const [now, before] = [{ ...fieldsOf(form), position: number(form.position) }, { ...fieldsOf(opened), position: number(opened.position) }]
  const changed = Object.fromEntries(Object.entries(now).filter(([field, value]) => !Object.is(value, before[field as keyof typeof before])))
  // An emptied number is a fault to be told, not a field to be left alone.
  for (const field of Object.keys(changed)) if (changed[field] === undefined) changed[field] = Number.NaN
  return read(shotChange, { ...changed, version })
}

export function readNewSequence(form: ShotForm) {
  const answer = read(newSequence, { code: form.newSequence.code.toUpperCase().trim(), title: form.newSequence.title })
  if (answer.body) return answer
  return { body: null, complaints: Object.fromEntries(Object.entries(answer.complaints).map(([path, text]) => [`newSequence.${path}`, text])) }
}

/** Line by line, for showing two side by side. */
export function shotRows(form: ShotForm, production: Production): [string, string][] {
  const name = (id: string) => production.members.find((member) => member.id === id)?.name ?? (id ? 'somebody who left' : 'nobody')
  return [
    ['Title', form.title],
    ['Sequence', form.sequence === 'new' ? form.newSequence.title : form.sequence],
    ['Frames', `${form.firstFrame}–${form.lastFrame}`],
    ['Rate', `${form.fps} fps`],
    ['Order', form.position],
    ['Due', form.dueOn ? dayInWords(form.dueOn) : 'not set'],
    ['Animator', name(form.animator)],
    ['Supervisor', name(form.supervisor)],
    ['Brief', form.brief],
  ]
}
