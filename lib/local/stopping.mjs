// @ts-check

/**
 * Aborted when we are asked to stop: Ctrl-C, an ending terminal, or the end of the npm that runs us (a signal to npm
 * reaches only the shell between). Ctrl-C again, a moment later, ends at once.
 * @returns {AbortSignal}
 */
export function stopSignal() {
  const stopping = new AbortController()
  let asked = 0
  for (const name of /** @type {const} */ (['SIGINT', 'SIGTERM', 'SIGHUP'])) {
    process.on(name, () => {
      // npm passes Ctrl-C on although the terminal has sent it to us as well: that is not a second one.
      if (asked > 0 && Date.now() - asked > 1000 && name === 'SIGINT') process.exit(130)
      asked ||= Date.now()
      stopping.abort()
    })
  }
  const parent = process.ppid
  if (process.env.npm_lifecycle_event) {
    setInterval(() => {
      if (process.ppid !== parent) stopping.abort()
    }, 1000).unref()
  }
  return stopping.signal
}
