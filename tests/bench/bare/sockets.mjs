/**
 * What the live connection is measured against: a bare socket.io server whose POST sends the comment itself to everybody.
 * It stores nothing, asks nobody who they are, and forgets. Prints its port.
 */
import { createServer } from 'node:http'
import { Server } from 'socket.io'

let n = 0
const server = createServer(async (request, response) => {
  if (request.method !== 'POST') return response.writeHead(404).end()
  const chunks = []
  for await (const chunk of request) chunks.push(chunk)
  n += 1
  const comment = { ...JSON.parse(Buffer.concat(chunks).toString('utf8')), n }
  io.emit('comment', comment)
  response.setHeader('content-type', 'application/json')
  response.end(JSON.stringify(comment))
})
const io = new Server(server, { serveClient: false, perMessageDeflate: false })
server.listen(0, '127.0.0.1', () => console.log(server.address().port))
