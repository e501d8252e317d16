import type { MailWords } from './mail-words'
import type { MailKind, MailMessage, Message } from './message'
import { invitationWords, membershipWords, roleChangedWords } from './wording-teams'
import { day } from './wording-time'

const ignore = 'If you did not ask for this, leave it: nothing changes unless the button is used.'

const wording: { [K in MailKind]: (message: Message<K>) => MailWords } = {
  invitation: invitationWords,
  membership: membershipWords,
  roleChanged: roleChangedWords,

  verifyAddress: ({ name, path, until }) => ({
    subject: 'Confirm your e-mail address',
    heading: 'Confirm your e-mail address',
    paragraphs: [
      `Hello ${name},`,
      `please confirm that this address is yours. The button works once, until ${day(until)}.`,
    ],
    action: { label: 'Confirm this address', path },
    afterword: [ignore],
  }),

  resetPassword: ({ name, path, until }) => ({
    subject: 'Choose a new password',
    heading: 'Choose a new password',
    paragraphs: [
      `Hello ${name},`,
      `somebody, most likely you, asked for a new password for this address. The button works once, until ${day(until)}.`,
      'Your present password stays as it is until then.',
    ],
    action: { label: 'Choose a new password', path },
    afterword: [ignore, 'Do not pass this mail on: whoever has it can choose the password.'],
  }),

  alreadyRegistered: ({ name, signInPath }) => ({
    subject: 'You have an account already',
    heading: 'You have an account already',
    paragraphs: [
      `Hello ${name},`,
      'somebody, most likely you, tried to make a new account with this address. It has one, so nothing was changed.',
      'Sign in with it; if the password is lost, the sign-in page helps to choose a new one.',
    ],
    action: { label: 'Go to the sign-in page', path: signInPath },
    afterword: ['If it was not you, there is nothing to do.'],
  }),

  changeAddress: ({ name, newAddress, path, until }) => ({
    subject: 'Allow your e-mail address to be changed',
    heading: 'Allow your e-mail address to be changed',
    paragraphs: [
      `Hello ${name},`,
      `somebody who is signed in as you wants to sign in with ${newAddress} from now on, in place of this address.`,
      `The button works once, until ${day(until)}. The new address is then asked to confirm.`,
    ],
    action: { label: 'Allow the change', path },
    afterword: ['If this was not you, do not use the button, and change your password: somebody may know it.'],
  }),

  addressChanged: ({ name, newAddress, at }) => ({
    subject: 'Your e-mail address was changed',
    heading: 'Your e-mail address was changed',
    paragraphs: [
      `Hello ${name},`,
      `since ${day(at)} your account is signed in to with ${newAddress}. Nothing more will be sent to this address.`,
    ],
    afterword: ['If this was not you, tell an owner of your team at once.'],
  }),

  securityNotice: ({ name, event, at, path }) => ({
    ...noticeWords[event],
    paragraphs: [`Hello ${name},`, `${noticeWords[event].sentence} This was at ${day(at)}.`],
    action: { label: 'See your account', path },
    afterword: ['If this was not you, choose a new password at once and end all other sessions.'],
  }),
}

const noticeWords = {
  passwordChanged: {
    subject: 'Your password was changed',
    heading: 'Your password was changed',
    sentence: 'the password of your account was changed.',
  },
  secondFactorOn: {
    subject: 'A second step was added to signing in',
    heading: 'A second step was added to signing in',
    sentence: 'signing in to your account now also asks for a code from your authenticator.',
  },
  secondFactorOff: {
    subject: 'The second step of signing in was taken away',
    heading: 'The second step of signing in was taken away',
    sentence: 'signing in to your account no longer asks for a code from your authenticator: the password is enough.',
  },
  sessionsEnded: {
    subject: 'You were signed out everywhere',
    heading: 'You were signed out everywhere',
    sentence: 'your account was signed out on all devices.',
  },
} satisfies Record<Message<'securityNotice'>['event'], { subject: string; heading: string; sentence: string }>

/** What a message says. */
export function wordsOf<K extends MailKind>(message: Extract<MailMessage, { kind: K }>): MailWords {
  return (wording[message.kind as K] as (message: Message<K>) => MailWords)(message as Message<K>)
}
