import type { Letter } from '@/lib/letter';

const escape = (text: string): string =>
  text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;').replaceAll('"', '&quot;');

/** One short letter with one link, as text and as HTML. */
function letter(to: string, subject: string, lines: readonly string[], action: string, link: string): Letter {
  const text = [...lines, '', `${action}: ${link}`, '', 'Thrum'].join('\n');
  const html = `<div style="font:15px/24px sans-serif;color:#1C2230;max-width:520px">${lines
    .map((line) => `<p>${escape(line)}</p>`)
    .join(
      '',
    )}<p><a href="${escape(link)}" style="color:#2A5078;font-weight:600">${escape(action)}</a></p><p style="color:#625F58">Thrum</p></div>`;
  return { to, subject, text, html };
}

export const verifyLetter = (to: string, link: string): Letter =>
  letter(
    to,
    'Confirm your address for Thrum',
    [
      'Somebody, we hope you, made an account at Thrum with this address.',
      'The link works for an hour. If it was not you, leave it: nothing happens.',
    ],
    'Confirm this address',
    link,
  );

export const resetLetter = (to: string, link: string): Letter =>
  letter(
    to,
    'Choose a new password for Thrum',
    [
      'Somebody, we hope you, asked for a new password.',
      'The link works for an hour. If it was not you, leave it: your password stays.',
    ],
    'Choose a new password',
    link,
  );

export const existingLetter = (to: string, link: string): Letter =>
  letter(
    to,
    'You already have an account at Thrum',
    ['Somebody, we hope you, tried to sign up with this address. It has an account already.'],
    'Sign in',
    link,
  );

export const invitationLetter = (
  to: string,
  workspace: string,
  by: string,
  role: string,
  link: string,
): Letter =>
  letter(
    to,
    `${by} invites you to ${workspace}`,
    [
      `${by} invites you to the workspace ${workspace} at Thrum, as ${role}.`,
      'The link works for seven days.',
    ],
    'See the invitation',
    link,
  );
