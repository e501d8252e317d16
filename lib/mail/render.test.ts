import { describe, expect, it } from 'vitest'
import type { MailKind, MailMessage } from './message'
import { render } from './render'

const base = 'https://tables.example.com'
const until = '2031-03-04T14:05:00Z'

const samples: { [K in MailKind]: Extract<MailMessage, { kind: K }> } = {
  invitation: {
    kind: 'invitation',
    team: 'Kestrel Salts',
    inviter: 'Ada Byron',
    role: 'analyst',
    projects: ['Brine', 'Kiln'],
    path: '/invitation/abc?token=s3cret-token',
    until,
  },
  verifyAddress: { kind: 'verifyAddress', name: 'Ada', path: '/verify?token=s3cret-token', until },
  resetPassword: { kind: 'resetPassword', name: 'Ada', path: '/reset?token=s3cret-token', until },
  alreadyRegistered: { kind: 'alreadyRegistered', name: 'Ada', signInPath: '/sign-in' },
  changeAddress: {
    kind: 'changeAddress',
    name: 'Ada',
    newAddress: 'new@example.com',
    path: '/verify?token=s3cret-token',
    until,
  },
  addressChanged: { kind: 'addressChanged', name: 'Ada', newAddress: 'new@example.com', at: until },
  securityNotice: { kind: 'securityNotice', name: 'Ada', event: 'secondFactorOff', at: until, path: '/account' },
  membership: { kind: 'membership', name: 'Ada', team: 'Kestrel Salts', event: 'deactivated' },
  roleChanged: { kind: 'roleChanged', name: 'Ada', team: 'Kestrel Salts', role: 'checker', path: '/kestrel' },
}

const pathOf = (message: MailMessage) =>
  'path' in message ? message.path : 'signInPath' in message ? message.signInPath : undefined

describe.each(Object.entries(samples))('the mail "%s"', (_, message) => {
  const { subject, text, html } = render(message, base)

  it('says the same in plain text and in HTML, with a link of this site', () => {
    const path = pathOf(message)
    const link = path && `${base}${path}`
    if (link) {
      expect(text.split('\n')).toContain(link)
      expect(html).toContain(`href="${link}"`)
    }
    expect(text).not.toMatch(/<[a-z]|&amp;|undefined|null|Invalid/)
    expect(html).not.toMatch(/undefined|null|Invalid/)
    expect(html.match(/https?:\/\/[^"<\s]+/g)?.every((address) => address.startsWith(base))).toBe(true)
    for (const paragraph of text.split('\n-- \n')[0]?.split('\n\n') ?? []) {
      if (!paragraph.includes('http')) expect(html).toContain(paragraph.trim().replace(/'/g, '&#39;'))
    }
  })

  it('has a subject in one line and in sentence case, with no secret in it', () => {
    expect(subject).toMatch(/^\p{Lu}[^\p{Cc}]+[^.]$/u)
    expect(subject).not.toContain('s3cret')
    expect(html).toContain(`<title>${subject}</title>`)
  })
})

describe('an invitation', () => {
  it('reads well as plain text', () => {
    expect(render(samples.invitation, base).text).toMatchInlineSnapshot(`
      "You are asked to join the team “Kestrel Salts” on Tallybrook, where stream tables of plants are worked out together, as an analyst, who files the results of the laboratory.

      You will see the projects “Brine” and “Kiln”.

      The invitation stands until 4 March 2031, 14:05 UTC. You can accept it with an account that you have, or make one.

      See the invitation:
      https://tables.example.com/invitation/abc?token=s3cret-token

      If you do not know who this is, leave it: you join nothing unless you accept.

      Do not pass this mail on: the invitation is for this address.

      -- 
      Tallybrook, https://tables.example.com
      Answers to this address are not read.
      "
    `)
  })

  it('counts the projects that it does not name', () => {
    const projects = Array.from({ length: 11 }, (_, place) => `P${place + 1}`)
    const { text } = render({ ...samples.invitation, projects }, base)
    expect(text).toContain('the projects “P1”, “P2”, “P3”, “P4”, “P5”, “P6”, “P7”, “P8” and 3 more.')
    expect(render({ ...samples.invitation, projects: [] }, base).text).not.toContain('project')
  })
})

describe('what people typed', () => {
  const nasty = `"><script>alert('x')</script>\r\nBcc: all@example.com\r\n\r\n<img src=//evil.example/x> & https://evil.example`
  const { subject, text, html } = render(
    { ...samples.invitation, team: nasty, inviter: nasty, projects: [nasty] },
    base,
  )

  it('stays text in the HTML', () => {
    expect(html).not.toMatch(/<script|<img/i)
    expect(html).toContain('&quot;&gt;&lt;script&gt;alert(&#39;x&#39;)&lt;/script&gt;')
    const parsed = html.match(/<[a-z][^>]*>/gi) ?? []
    const plain = render(samples.invitation, base).html.match(/<[a-z][^>]*>/gi) ?? []
    expect(parsed).toEqual(plain)
  })

  it('cannot begin a header or a line', () => {
    expect(subject).not.toMatch(/[\r\n]/)
    expect(text).not.toMatch(/^Bcc:/m)
  })

  it('makes no link', () => {
    expect(text).not.toContain('evil.example')
    expect(html).not.toContain('evil.example')
    expect(text).not.toContain('https://e')
  })
})

describe('a link', () => {
  it.each([
    'https://evil.example/',
    '//evil.example',
    '/\\evil.example',
    'javascript:alert(1)',
    'reset',
    '/\t/evil.example',
  ])('to %s is refused', (path) => {
    expect(() => render({ ...samples.resetPassword, path }, base)).toThrow()
  })

  it('keeps the port of the site', () => {
    expect(render(samples.resetPassword, 'http://127.0.0.1:3000').text).toContain(
      'http://127.0.0.1:3000/reset?token=s3cret-token\n',
    )
  })

  it('in an attribute cannot leave it', () => {
    const { html } = render({ ...samples.resetPassword, path: `/reset?a="onmouseover='x'&b=<i>` }, base)
    expect(html).not.toMatch(/"onmouseover|<i>/)
  })
})
