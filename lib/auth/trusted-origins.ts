const loopback = ['127.0.0.1', 'localhost']

/** Origins whose browsers may sign in. On one's own machine both names of it work, whichever was typed. */
export function trustedOrigins(address: string, isLocal: boolean): string[] {
  const { origin, hostname, protocol, port } = new URL(address)
  if (!isLocal || !loopback.includes(hostname)) return [origin]
  return loopback.map((name) => `${protocol}//${name}${port ? `:${port}` : ''}`)
}
