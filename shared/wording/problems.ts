import {type ProblemCode} from '../problem';

/** What went wrong and what to do, by the code of a problem; each under 25 words. */
const SENTENCES: Readonly<Record<ProblemCode, string>> = {
  'attempt-over': 'This attempt is handed in. Nothing more can be added to it.',
  'batch-differs': 'The server holds other acts at this place. Open the attempt again to go on.',
  'batch-missing': 'Some acts have not arrived yet. They are sent again from this device.',
  'body-too-large': 'This is too large to be sent. Send less at once.',
  'entry-refused': 'An act is not allowed in this exercise. Nothing of it was stored.',
  'forged-request': 'This page is out of date. Load it again; what you typed is kept.',
  'in-use': 'It is still used elsewhere, so it cannot be removed.',
  internal: 'Something went wrong on the server. Try again; if it stays, tell the number below.',
  'invalid-input': 'Something that was typed does not fit. Look at the marked fields.',
  'not-allowed': 'Your role does not allow this. Ask your administrator.',
  'not-found': 'It does not exist, or it belongs to another organisation.',
  'not-publishable': 'The exercise cannot be published as it is. Look at the marked places.',
  'not-signed-in': 'You are not signed in any more. Sign in again; nothing is lost.',
  'replay-limit': 'This run is too long to be worked out again. It cannot be scored.',
  'too-fast': 'More time was sent than has passed. Wait a moment, then try again.',
  'too-many-requests': 'Too many tries. Wait a while, then try again.',
  unavailable: 'The server cannot answer right now. Try again in a minute.',
  'unsupported-media': 'This kind of file cannot be read here.',
  'version-conflict': 'Somebody changed this meanwhile. Look at both, then save again.',
  'writer-changed': 'This attempt goes on in another place. Take it over to go on here.',
};

/** A problem as a sentence for people. `retryAfterS` is how long to wait [s], where the server said so. */
export function problemSentence(code: ProblemCode, retryAfterS?: number): string {
  if (code !== 'too-many-requests' || retryAfterS === undefined) return SENTENCES[code];
  return `Too many tries. Wait ${waitWords(retryAfterS)}, then try again.`;
}

function waitWords(seconds: number): string {
  const whole = Math.max(1, Math.ceil(seconds));
  if (whole < 90) return `${whole} ${whole === 1 ? 'second' : 'seconds'}`;
  return `${Math.ceil(seconds / 60)} minutes`;
}
