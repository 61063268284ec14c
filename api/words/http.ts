/** Refusals that any route can give. */
import { defineProblems } from './problem-words.ts';

export const httpProblems = defineProblems({
  not_found: {
    status: 404,
    title: 'Nothing here',
    detail: 'Nothing stands at this address, or it is not open to you.',
  },
  role_refused: {
    status: 403,
    title: 'Not open to your role',
    detail: 'This is open to: {roles}. The owner of the study gives roles.',
  },
  administrator_only: {
    status: 403,
    title: 'Open to administrators',
    detail: 'This is open to the administrator of the installation.',
  },
  password_change_needed: {
    status: 403,
    title: 'Change the password first',
    detail: 'Your password is a temporary one. Choose your own, then go on.',
  },
  origin_refused: {
    status: 403,
    title: 'Request from another site',
    detail: 'The request came from another site. Open Tetherline itself and try again.',
  },
  invalid_request: {
    status: 422,
    title: 'Entries need attention',
    detail: 'Some entries can’t be used as they stand. Nothing was changed.',
  },
  malformed_json: {
    status: 400,
    title: 'Not JSON',
    detail: 'The body is not readable JSON. Send one JSON document in UTF-8.',
  },
  json_expected: {
    status: 415,
    title: 'JSON expected',
    detail: 'Send the body as application/json.',
  },
  body_too_large: {
    status: 413,
    title: 'Body too large',
    detail: 'The body is larger than this route takes. Send less at a time.',
  },
  malformed_request: {
    status: 400,
    title: 'Unreadable request',
    detail: 'The request can’t be read as it stands. Nothing was changed.',
  },
  stale_version: {
    status: 409,
    title: 'Changed meanwhile',
    detail:
      'Someone changed this since you read it (yours: {given}, now: {held}). Read it again and choose.',
  },
  idempotency_key_form: {
    status: 400,
    title: 'Idempotency-Key not usable',
    detail: 'The Idempotency-Key takes 8 to 128 letters, digits, hyphens or underscores.',
  },
  idempotency_key_reused: {
    status: 422,
    title: 'Idempotency-Key used before',
    detail: 'This Idempotency-Key belongs to a different request. Use a new key for a new act.',
  },
  idempotency_running: {
    status: 409,
    title: 'Still being done',
    detail: 'The same request is being done at this moment. Wait for its answer.',
  },
  already_done: {
    status: 409,
    title: 'Done already',
    detail: 'An earlier request with this key did it. Load the page to see the result.',
  },
  busy: {
    status: 503,
    title: 'Busy',
    detail: 'Others changed the same rows at this moment. Nothing was kept; try again.',
  },
  not_ready: {
    status: 503,
    title: 'Not ready',
    detail: 'The database or the file storage can’t be reached at this moment.',
  },
  metrics_token_needed: {
    status: 401,
    title: 'Token needed',
    detail:
      'Figures are given to this machine itself, or to a request with the header Authorization: Bearer and the value of METRICS_TOKEN.',
  },
  failed: {
    status: 500,
    title: 'The server failed',
    detail: 'The server could not do this. Nothing was changed. Number for support: {requestId}.',
  },
});
