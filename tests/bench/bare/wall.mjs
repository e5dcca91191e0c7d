/**
 * What the wall's route is measured against: a plain HTTP handler that runs the same statements on the same file with the
 * bare driver, and sends the rows as JSON. No framework, no model, no session, no permission.
 * Arguments: the database file, and a JSON list of `{ sql, bind }`. Prints its port.
 */
import { createServer } from 'node:http'
import sqlite3 from 'sqlite3'

const [file, text] = process.argv.slice(2)
const database = new sqlite3.Database(file, sqlite3.OPEN_READONLY)
const statements = JSON.parse(text).map(({ sql, bind }) => ({
  prepared: database.prepare(sql),
  // The driver wants the name as it stands in the statement.
  bind: Object.fromEntries(Object.entries(bind).map(([name, value]) => [`$${name}`, value])),
}))

const rows = ({ prepared, bind }) =>
  new Promise((resolve, reject) => prepared.all(bind, (problem, found) => (problem ? reject(problem) : resolve(found))))

const server = createServer(async (_request, response) => {
  const answer = []
  for (const statement of statements) answer.push(await rows(statement))
  response.setHeader('content-type', 'application/json')
  response.end(JSON.stringify(answer))
})
server.listen(0, '127.0.0.1', () => console.log(server.address().port))
