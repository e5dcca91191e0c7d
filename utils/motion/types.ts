/**
 * The words the judge and its callers share. Only shapes live here: limits and refusals belong to the contracts, sums to the
 * other files of this folder.
 */

/** The laws a list can claim. */
export type Law = 'odd-rule' | 'topple' | 'pendulum' | 'steady'

/** What a claim says of the first key: the motion starts from rest there, or may already be under way. */
export type Start = 'rest' | 'any'

/** What the readings count: degrees, drawing units along a straight path, or drawing units along an arc of known radius. */
export type Measure = 'angle' | 'distance' | 'arc'

/** How a body goes down a slope; decides how much of gravity ends up in the motion. */
export type Roll = 'slide' | 'ball' | 'cylinder' | 'shell' | 'hoop'

export type Shape = 'rod' | 'block' | 'cylinder' | 'pole' | 'bob' | 'hung-rod' | 'custom'

interface WithGravity {
  /** m/s²; standard gravity when left out. */
  gravity?: number
}

/** A thin rod on its foot; height in metres. */
export interface RodSubject extends WithGravity { shape: 'rod', height: number }
/** A block over its lower edge; width and height in metres. */
export interface BlockSubject extends WithGravity { shape: 'block', width: number, height: number }
/** An upright cylinder over its rim; metres. */
export interface CylinderSubject extends WithGravity { shape: 'cylinder', radius: number, height: number }
/** A pole with a compact head; metres and kilograms (only the ratio of the masses matters). */
export interface PoleSubject extends WithGravity { shape: 'pole', height: number, mass: number, headMass: number, headHeight: number }
/** A small bob on a light cord; metres. */
export interface BobSubject extends WithGravity { shape: 'bob', length: number }
/** A rod hung by its end; metres. */
export interface HungRodSubject extends WithGravity { shape: 'hung-rod', length: number }
/** Any body whose equal-pendulum length I/(m·d) is known; metres. */
export interface CustomSubject extends WithGravity { shape: 'custom', equalLength: number }

export type BodySubject =
  | RodSubject | BlockSubject | CylinderSubject | PoleSubject | BobSubject | HungRodSubject | CustomSubject

/** Something falling, sliding or rolling: drawing scale (units per metre), slope (degrees, 90 is a free fall) and way of going. */
export interface PathSubject extends WithGravity { unitsPerMetre?: number, slope?: number, roll?: Roll }

/** What the shot says it shows. */
export type Subject = BodySubject | PathSubject

/** One drawing on the list. */
export interface Key { frame: number, reading: number }

/** A list and its claim, as the check call takes it. */
export interface CheckRequest {
  law: Law
  /** Frames per second, 1 to 240. */
  fps: number
  measure: Measure
  /** 'deg' for angles, the drawing unit otherwise ('px'). */
  unit: string
  /** How far a drawing may sit off without anyone meaning it, in reading units. */
  slop: number
  /** The share of a gap that nobody would notice. */
  tolerance: number
  /** Frames strictly increasing whole numbers. */
  keys: Key[]
  /** Drawing units; needed where measure is 'arc'. */
  radius?: number
  /** Degrees: the angle that reading 0 stands for. */
  zeroAt?: number
  /** Whether the motion starts from rest at its first key; 'any' when left out. Even spacing never rests. */
  start?: Start
  subject?: Subject
}

export type Verdict = 'holds' | 'breaks' | 'undecided'

export type FindingKind = 'misplaced' | 'held' | 'skipped' | 'wrong-law' | 'wrong-scale' | 'not-at-rest' | 'backward'

/** One key as judged. `null` stands where a number would have no meaning (no law fitted, law at a standstill, no gap after the last). */
export interface JudgedKey {
  frame: number
  reading: number
  /** The law's reading at this frame. */
  law: number | null
  /** Posted minus law, reading units. */
  offset: number | null
  /** Frames by which the drawing is ahead (positive) or behind (negative) of the law. */
  offsetFrames: number | null
  /** Spacing to the next key, reading units. */
  gap: number | null
  /** The spacing the law asks for. */
  lawGap: number | null
  /** What may be off here without being noticed. */
  allowance: number | null
  breaks: boolean
}

export interface Finding {
  kind: FindingKind
  /** The drawings concerned; the first late or early one for held/skipped; empty for the whole list. */
  frames: number[]
  /**
   * How much, in the kind's own measure. misplaced and backward: reading units; held and skipped: frames late or early;
   * wrong-law: misfit of the claimed law (1 is at the edge of notice); wrong-scale: size read over size claimed;
   * not-at-rest: frames before the first drawing at which it reads as let go, negative where after it, 0 where it never stands still.
   */
  amount: number
  /** One plain sentence. */
  text: string
}

export interface LawMisfit {
  law: Law
  /** Root mean square of offset/allowance; 1 is at the edge of notice. */
  misfit: number
}

/** A size with its 95 % interval. Unit: 'm', '<unit>/m' or 'm/s²'. */
export interface SizeReading { value: number, low: number, high: number, unit: string }

/** Frames the claimed size needs for the same motion, and frames the list uses. */
export interface ClaimFrames { frames: number, usedFrames: number }

export interface CheckResult {
  verdict: Verdict
  /** A sentence where the verdict is 'undecided', else null. */
  reason: string | null
  keys: JudgedKey[]
  findings: Finding[]
  /** Every law that the measure can take, best first. */
  readsAs: LawMisfit[]
  size: SizeReading | null
  claim: ClaimFrames | null
  ruled: { fit: Key[], claim: Key[] | null }
}
