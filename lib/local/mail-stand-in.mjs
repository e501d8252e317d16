// @ts-check
import { randomUUID } from 'node:crypto'
import { mkdirSync, readdirSync, renameSync, rmSync, writeFileSync } from 'node:fs'
import path from 'node:path'

/** @typedef {{ url: string, folder: string, close: () => Promise<void> }} MailStandIn */

/** So many mails are kept; older ones go. */
const kept = 500
const longest = 5_000_000

/**
 * A mail server for a machine that has none: takes everything on loopback, sends nothing on, and keeps each mail in
 * `folder`, as it came (.eml) and taken apart (.json). The application shows them at /local/mail.
 * @param {string} folder @returns {Promise<MailStandIn>}
 */
export async function startMailStandIn(folder) {
  // Loaded only when called: dependencies may have to be installed first.
  const { SMTPServer } = await import('smtp-server')
  mkdirSync(folder, { recursive: true, mode: 0o700 })
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['AUTH', 'STARTTLS'],
    size: longest,
    logger: false,
    onData(stream, session, done) {
      collect(stream)
        .then((raw) => keep(folder, raw, session.envelope))
        .then(
          () => done(),
          (cause) => done(cause instanceof Error ? cause : new Error(String(cause))),
        )
    },
  })
  server.on('error', () => {}) // a line that breaks is the sender's to tell
  await new Promise((resolve, reject) => {
    server.once('error', reject)
    server.listen(0, '127.0.0.1', () => resolve(undefined))
  })
  const address = server.server.address()
  const port = typeof address === 'object' && address ? address.port : 0
  const close = () => /** @type {Promise<void>} */ (new Promise((resolve) => server.close(() => resolve())))
  return { url: `smtp://127.0.0.1:${port}`, folder, close }
}

/** @param {AsyncIterable<Uint8Array>} stream */
async function collect(stream) {
  const chunks = []
  for await (const chunk of stream) chunks.push(chunk)
  return Buffer.concat(chunks)
}

/**
 * @param {string} folder @param {Buffer} raw
 * @param {{ mailFrom: { address: string } | false, rcptTo: { address: string }[] }} envelope
 */
async function keep(folder, raw, envelope) {
  const { default: PostalMime } = await import('postal-mime')
  const mail = await PostalMime.parse(raw)
  const at = new Date().toISOString()
  // Sorts by time; the rest keeps two of one moment apart.
  const id = `${at.replace(/[^0-9]/g, '')}-${randomUUID().slice(0, 8)}`
  const parsed = {
    id,
    at,
    from: mail.from?.address ?? '',
    to: envelope.rcptTo.map(({ address }) => address),
    subject: mail.subject ?? '',
    messageId: mail.messageId ?? '',
    text: mail.text ?? '',
    html: mail.html ?? '',
  }
  writeFileSync(path.join(folder, `${id}.eml`), raw, { mode: 0o600 })
  // Whole or not there at all: the page may be reading.
  const draft = path.join(folder, `.${id}.draft`)
  writeFileSync(draft, JSON.stringify(parsed), { mode: 0o600 })
  renameSync(draft, path.join(folder, `${id}.json`))
  dropOld(folder)
}

/** @param {string} folder */
function dropOld(folder) {
  const ids = readdirSync(folder)
    .filter((name) => name.endsWith('.json'))
    .sort()
    .map((name) => name.slice(0, -'.json'.length))
  for (const id of ids.slice(0, Math.max(0, ids.length - kept))) {
    for (const ending of ['json', 'eml']) rmSync(path.join(folder, `${id}.${ending}`), { force: true })
  }
}
