import type { Letter } from '../../ports/mail/letter.js';

/** The secret rides in the fragment: it reaches neither the server's logs nor another site. */
export const linkTo = (publicUrl: string, page: string, token: string): string =>
  new URL(`/${page}#token=${token}`, publicUrl).href;

const NOT_YOU = 'If it was not you, there is nothing to do: without this link nothing changes.';

export const resetLetter = (name: string, url: string): Letter => ({
  subject: 'Choose a new password',
  paragraphs: [`Hello ${name},`, 'somebody, most likely you, asked for a new password for this address.'],
  action: { label: 'Choose a new password', url },
  afterwards: ['The link works once, for one hour.', NOT_YOU],
});

export const passwordChangedLetter = (name: string): Letter => ({
  subject: 'Your password was changed',
  paragraphs: [
    `Hello ${name},`,
    'the password of your account was changed a moment ago, and your other devices were signed out.',
    'If it was not you, choose a new password at once through “Forgotten password”.',
  ],
});

export const signUpAgainLetter = (name: string, signInUrl: string): Letter => ({
  subject: 'You already have an account',
  paragraphs: [
    `Hello ${name},`,
    'somebody, most likely you, tried to sign up with this address, with another password than yours. It already has an account, so nothing was changed.',
  ],
  action: { label: 'Sign in', url: signInUrl },
  afterwards: [
    'Signed in, you can be a member of several companies. If the password has slipped your mind, choose a new one through “Forgotten password”.',
  ],
});

export const confirmEmailLetter = (name: string, url: string): Letter => ({
  subject: 'Confirm your new address',
  paragraphs: [`Hello ${name},`, 'this address was given as the new one of your account.'],
  action: { label: 'Use this address', url },
  afterwards: ['The link works once, for one day.', NOT_YOU],
});

export const addressInUseLetter = (name: string): Letter => ({
  subject: 'This address already has an account',
  paragraphs: [
    `Hello ${name},`,
    'somebody, most likely you, asked to use this address for another account. It already has an account of its own, so it can’t be used for a second one.',
  ],
});

export const emailChangeAskedLetter = (name: string): Letter => ({
  subject: 'A new address was asked for',
  paragraphs: [
    `Hello ${name},`,
    'somebody signed in to your account, most likely you, asked to change its e-mail address. It changes once the new address is confirmed.',
    'If it was not you, change your password: that also stops the change.',
  ],
});

export const emailChangedLetter = (name: string): Letter => ({
  subject: 'Your address was changed',
  paragraphs: [
    `Hello ${name},`,
    'your account now uses another e-mail address; this one no longer signs you in. If it was not you, tell the owner of your company.',
  ],
});
