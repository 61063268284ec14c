/** Letters to people. None of them carries a password, a reading or an arm. */
interface LetterWords {
  subject: string;
  text: string;
}

export type LetterKind = 'account created' | 'account reset';

export function letterWords(kind: LetterKind, name: string, address: string): LetterWords {
  if (kind === 'account created') {
    return {
      subject: 'An account in Tetherline was made for you',
      text: `Dear ${name},

the administrator has made an account for you at ${address}.
You get your temporary password from the administrator by another way; at the first sign-in you choose your own.

If you did not expect this, tell the administrator.
`,
    };
  }
  return {
    subject: 'Your access to Tetherline was reset',
    text: `Dear ${name},

the administrator has reset your access at ${address}. Your old password no longer works, and you are signed out everywhere.
You get a temporary password from the administrator by another way; at the next sign-in you choose your own.

If you did not ask for this, tell the administrator at once.
`,
  };
}
