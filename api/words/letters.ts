/** English of the demo's page of letters. */
export const lettersWords = {
  title: 'Letters of the demo',
  lead: 'Nothing here was delivered. The demo keeps its letters on this machine, newest first.',
  none: 'No letters yet. The demo keeps its letters on this machine and delivers none.',
  meta: (to: string, at: string) => `To ${to}, ${at}`,
};
