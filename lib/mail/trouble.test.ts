import { describe, expect, it } from 'vitest'
import { troubleOf } from './trouble'

describe('trouble with a mail server', () => {
  it.each([
    [
      { code: 'EENVELOPE', command: 'RCPT TO', responseCode: 550, response: '550 5.1.1 no such user' },
      true,
      '(550 5.1.1)',
    ],
    [
      { code: 'EENVELOPE', command: 'RCPT TO', responseCode: 450, response: '450 4.2.1 greylisted' },
      false,
      '(450 4.2.1)',
    ],
    [{ code: 'EMESSAGE', command: 'DATA', responseCode: 554, response: '554 no' }, true, 'refused the message (554)'],
    [{ code: 'EENVELOPE', command: 'MAIL FROM', responseCode: 553, response: '553 no' }, false, 'MAIL_FROM'],
    [{ code: 'EAUTH', command: 'AUTH PLAIN', responseCode: 535, response: '535 no' }, false, 'SMTP_URL (535)'],
    [{ code: 'ETIMEDOUT' }, false, 'in time'],
    [{ code: 'ECONNECTION' }, false, 'could not be reached'],
    [undefined, false, 'could not be reached'],
  ])('%j', (cause, isFinal, words) => {
    const trouble = troubleOf(cause)
    expect(trouble.isFinal).toBe(isFinal)
    expect(trouble.sentence).toContain(words)
  })

  it("keeps the server's own words out: they may quote a link", () => {
    const response = '552 5.7.0 blocked: https://tables.example.com/reset?token=s3cret'
    const { sentence } = troubleOf({ code: 'EMESSAGE', command: 'DATA', responseCode: 552, response })
    expect(sentence).toBe('The mail server refused the message (552 5.7.0).')
  })
})
