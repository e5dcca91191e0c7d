/**
 * Preloaded into a server (`node --import`) that was started with an IPC channel: when whoever started it is gone,
 * even by SIGKILL, the server stops as if told to, and does not stay behind holding the port and the database.
 */
if (process.connected) {
  process.channel.unref()
  process.once('disconnect', () => {
    process.kill(process.pid, 'SIGTERM')
    setTimeout(() => process.exit(1), 15_000).unref()
  })
}
