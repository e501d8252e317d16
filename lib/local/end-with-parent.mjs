// @ts-check
// Loaded before the server: when whoever started it is gone (even killed outright), the server stops too.
process.once('disconnect', () => {
  setTimeout(() => process.exit(1), 5000).unref()
  process.kill(process.pid, 'SIGTERM')
})
