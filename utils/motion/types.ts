/**
 * The words the judge and its callers share. Only shapes live here: limits and refusals belong to the contracts, sums to the
 * other files of this folder.
 */

/** The laws a list can claim. */
export type Law =
  | 'odd-rule' | 'topple' | 'pendulum' | 'steady'
  | 'slow-in' | 'swing-decay' | 'spin' | 'bounce' | 'flight' | 'over-edge'

/** The laws that a single row of readings can be held against; a flight needs points. */
export type ReadingLaw = Exclude<Law, 'flight'>

/** What a claim says of the first key: the motion starts from rest there, or may already be under way. */
export type Start = 'rest' | 'any'

/**
 * What the readings count: degrees, drawing units along a straight path, drawing units along an arc of known radius, or no readings
 * at all but points on the drawing.
 */
export type Measure = 'angle' | 'distance' | 'arc' | 'point'

/** The line that a point runs along on the drawing. */
export type PathKind = 'line' | 'circle' | 'parabola'

/** Which way y counts on the drawing: down as on a screen, or up. */
export type YAxis = 'down' | 'up'

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

/** One drawing of a list of points, drawing units. */
export interface PointKey { frame: number, x: number, y: number }

export interface Place { x: number, y: number }

/** A stretch of the list under a law of its own. Ends are frames of keys; a span begins on the key where the one before it ends. */
export interface Span {
  from: number
  to: number
  law: Law
  /** True where the span ends in a contact (a hit, a landing, a bounce): speed need not carry over into the next. */
  contact?: boolean
  /** Whether the span starts from rest at its first key. */
  start?: Start
  /** What moves, where the law needs to know; the claim's own when left out. */
  subject?: Subject
}

interface Rules {
  /** With spans, the law of the first one. */
  law: Law
  /** Frames per second, 1 to 240. */
  fps: number
  /** 'deg' for angles, the drawing unit otherwise ('px'). */
  unit: string
  /** How far a drawing may sit off without anyone meaning it, in reading units; drawing units for points. */
  slop: number
  /** The share of a gap that nobody would notice. */
  tolerance: number
  /** Whether the motion starts from rest at its first key; 'any' when left out. Even spacing never rests. */
  start?: Start
  subject?: Subject
  /** Two to four spans that cover the list from end to end, or 'find' for the judge to look for the joints itself. */
  spans?: Span[] | 'find'
}

/** A list of readings and its claim. */
export interface ReadingCheck extends Rules {
  measure: Exclude<Measure, 'point'>
  /** Frames strictly increasing whole numbers. */
  keys: Key[]
  /** Drawing units; needed where measure is 'arc'. */
  radius?: number
  /** Degrees: the angle that reading 0 stands for. */
  zeroAt?: number
}

/** A list of points and its claim. */
export interface PointCheck extends Rules {
  measure: 'point'
  keys: PointKey[]
  /** 'down' when left out. */
  yAxis?: YAxis
  /** The path that the claim names; found by the judge when left out. */
  path?: PathKind
  /** Where the body turns about, drawing units; fitted when left out. */
  pivot?: Place
}

/** A list and its claim, as the check call takes it. */
export type CheckRequest = ReadingCheck | PointCheck

export type Verdict = 'holds' | 'breaks' | 'undecided'

export type FindingKind = 'misplaced' | 'held' | 'skipped' | 'wrong-law' | 'wrong-scale' | 'not-at-rest' | 'backward'
  | 'broken-joint' | 'off-path' | 'wrong-release'

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
  /** Of a list of points: where the drawing sits and where the law puts it, drawing units, y as posted. `reading` is then found along the path. */
  point?: Place
  lawPoint?: Place | null
  /** Distance from the path, drawing units; to the left of the way it goes (on a screen) is positive. */
  offPath?: number
  /** Of a flight: its sideways motion, beside `reading` which counts the way down. */
  sideways?: { reading: number, law: number | null, offset: number | null, breaks: boolean }
}

/** The path that points run along, y as posted, angles in degrees. A circle also names the angle of `reading` 0 and which way it counts. */
export type FoundPath =
  | { kind: 'line', from: Place, to: Place, misfit: number }
  | {
    kind: 'circle', centre: Place, radius: number, given: boolean, nearlyStraight: boolean, misfit: number
    /** Where `reading` 0 stands, degrees from the x axis towards the y axis as posted; +1 where readings grow that way round, −1 against it. */
    zeroAt: number, counts: 1 | -1
  }
  /** y = apex.y + bend · (x − apex.x)². */
  | { kind: 'parabola', apex: Place, bend: number, misfit: number }

/** How one span was judged. */
export interface JudgedSpan {
  from: number
  to: number
  law: Law
  contact: boolean
  verdict: Verdict
  reason: string | null
  /** Root mean square of offset over allowance. */
  misfit: number | null
  readsAs: LawMisfit[]
  size: SizeReading | null
  figures: Figure[]
}

/** Where two spans meet. Speeds in reading units per frame, of points in drawing units and unsigned; null where a side could not be fitted. */
export interface JudgedJoint {
  frame: number
  contact: boolean
  before: number | null
  after: number | null
  /** How far the two lines lie apart at the joint, reading units; of points the distance on the drawing. */
  apart: number | null
  holds: boolean
}

/**
 * What else a law's timing tells, with its 95 % interval. restitution: share of the speed that a bounce gives back; share-lost: share of
 * the amplitude that each full swing loses; turns: turns per second; stop, apex, contact and release: a frame, whole or not;
 * release-angle: degrees from upright.
 */
export interface Figure {
  kind: 'restitution' | 'share-lost' | 'turns' | 'stop' | 'contact' | 'release' | 'release-angle' | 'gravity'
  value: number
  low: number
  high: number
  /** '', '%', 'frame', 'deg', 'turns/s', 'm/s²', '<unit>/m'. */
  unit: string
}

export interface Finding {
  kind: FindingKind
  /** The drawings concerned; the first late or early one for held/skipped; empty for the whole list. */
  frames: number[]
  /**
   * How much, in the kind's own measure. misplaced and backward: reading units; held and skipped: frames late or early;
   * wrong-law: misfit of the claimed law (1 is at the edge of notice); wrong-scale: size read over size claimed;
   * broken-joint: the change of speed, reading units per frame, of points the length of the change of velocity; off-path: distance off the path, drawing units; wrong-release: degrees
   * late (positive) or early.
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
  /** The laws' readings as points on the drawing, where the list was posted as points. */
  ruledPoints?: { fit: PointKey[], claim: PointKey[] | null }
  /** What `reading`, `law` and `offset` count where the list was posted as points. */
  reads?: { measure: 'angle' | 'distance', unit: string }
  path?: FoundPath | null
  spans?: JudgedSpan[]
  joints?: JudgedJoint[]
  figures?: Figure[]
}
