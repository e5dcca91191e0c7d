/** Every table's model. Shape and limits of the tables themselves are in server/migrations. */
import type { Sequelize } from 'sequelize'
import { Comment, initComment } from './comment'
import { Event, initEvent } from './event'
import { Flag, initFlag } from './flag'
import { Letter, initLetter } from './letter'
import { Link, initLink } from './link'
import { Membership, initMembership } from './membership'
import { Person, initPerson } from './person'
import { Production, initProduction } from './production'
import { Ruling, initRuling } from './ruling'
import { Sequence, initSequence } from './sequence'
import { Session, initSession } from './session'
import { Setting, initSetting } from './setting'
import { Shot, initShot } from './shot'
import { Take, initTake } from './take'
import { Thread, initThread } from './thread'
import { Waiver, initWaiver } from './waiver'

export { Comment, Event, Flag, Letter, Link, Membership, Person, Production, Ruling, Sequence, Session, Setting, Shot, Take, Thread, Waiver }

/** Binds every model to an open database. */
export function initModels(sequelize: Sequelize): void {
  initSetting(sequelize)
  initPerson(sequelize)
  initSession(sequelize)
  initProduction(sequelize)
  initMembership(sequelize)
  initLink(sequelize)
  initSequence(sequelize)
  initShot(sequelize)
  initTake(sequelize)
  initFlag(sequelize)
  initWaiver(sequelize)
  initThread(sequelize)
  initComment(sequelize)
  initRuling(sequelize)
  initEvent(sequelize)
  initLetter(sequelize)
}
