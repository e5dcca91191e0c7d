import { rows } from '~/server/models/database'

/** Somebody a ruling concerns, with the address that their account has right now. */
export interface Reader {
  id: string
  name: string
  email: string
}

/**
 * Who is written to when `takeId` is ruled on by `exceptPersonId`: the take's animator (who posted it, and the shot's animator),
 * the shot's supervisor, the production's coordinators, and everyone in the take's threads. Each once, by name; never who
 * ruled, never a disabled account, nobody who is no member any more, and nobody who asked not to be.
 */
export async function readersOf(takeId: string, exceptPersonId: string): Promise<Reader[]> {
  return rows<Reader>(
    `SELECT people.id, people.name, people.email
       FROM takes
       JOIN shots ON shots.id = takes.shot_id
       JOIN memberships ON memberships.production_id = shots.production_id
       JOIN people ON people.id = memberships.person_id
      WHERE takes.id = :takeId
        AND people.id <> :exceptPersonId
        AND people.disabled_at IS NULL
        AND (people.mail_wish = 'all'
             OR (people.mail_wish = 'own-takes' AND people.id IN (takes.person_id, shots.animator_id)))
        AND (people.id IN (takes.person_id, shots.animator_id, shots.supervisor_id)
             OR memberships.role = 'coordinator'
             OR people.id IN (
               SELECT person_id FROM threads
                WHERE threads.take_id = takes.id OR (threads.shot_id = shots.id AND threads.take_id IS NULL)
               UNION
               SELECT comments.person_id FROM comments JOIN threads ON threads.id = comments.thread_id
                WHERE threads.take_id = takes.id OR (threads.shot_id = shots.id AND threads.take_id IS NULL)))
      ORDER BY people.name, people.id`,
    { takeId, exceptPersonId },
  )
}
