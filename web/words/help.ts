/** The user guide, one page a role: only what works. */
export type Guide = {
  heading: string;
  sentence: string;
  parts: readonly { heading: string; steps: readonly string[] }[];
};

const everyone: Guide = {
  heading: 'For everyone',
  sentence: 'Signing in, moving about, and your own account.',
  parts: [
    {
      heading: 'Signing in and out',
      steps: [
        'Sign in with your e-mail and password. A temporary password has to be changed first.',
        'After 20 minutes without a touch you are signed out, and after 12 hours in any case. What was saved is kept.',
        'A lost password can’t be sent to you: the administrator of the installation gives you a new one.',
      ],
    },
    {
      heading: 'Moving about',
      steps: [
        'The top line names the study and your role in it. Under it stand the places open to that role.',
        'Who belongs to several studies changes between them at the name of the study.',
        'Your account holds the theme, the time zone that times are shown in, the password, and the list of places where you are signed in.',
      ],
    },
    {
      heading: 'Tables',
      steps: [
        'A column heading sorts; the line over the table filters; “Columns” chooses columns and the height of rows.',
        'The arrow keys move between rows. “Export as CSV” saves the rows and columns as you see them.',
        'The address of the page holds the view: send it to a colleague with the same rights, and they see the same.',
      ],
    },
  ],
};

const owner: Guide = {
  heading: 'For owners',
  sentence: 'Who belongs to the study, and how it is set up.',
  parts: [
    {
      heading: 'Members',
      steps: [
        'The person needs an account; the administrator creates it. Then add them by its e-mail address and choose their duties.',
        'Unblinded statistician and board member each exclude every other duty in the same study. The server refuses and says why.',
        'A coordinator sees subjects of the chosen sites only.',
        'Removing a member takes their access at once. What they entered and signed stays under their name. The last owner can’t be removed.',
      ],
    },
    {
      heading: 'Set-up',
      steps: [
        'Sites, arms, measures and the schedule of visits are read there. They were made from a file when the study began.',
        'No page shows which subject of a masked study is in which arm, to an owner either.',
      ],
    },
    {
      heading: 'Subjects, cuts and records',
      steps: ['An owner reads them and changes nothing there.'],
    },
  ],
};

const coordinator: Guide = {
  heading: 'For coordinators',
  sentence: 'Subjects of your sites, and files of readings.',
  parts: [
    {
      heading: 'Subjects',
      steps: [
        'Each subject stands with a cord: its visits at their true distance in time. The legend under the list names every mark.',
        'Open a subject to read visits and readings, with corrections, their reasons, and the file a reading came with.',
        'The search field at the top finds a subject by code.',
      ],
    },
    {
      heading: 'Import',
      steps: [
        'Choose the measure and upload a CSV file: a column of subject codes, one of values, and one that says when.',
        'Read the columns back as sentences and correct them. Then check: nothing is kept by checking.',
        'Each refused row is listed with its line and reason; the list can be saved as a file.',
        'Values outside the plausible range are kept only with one written explanation; else they are left out.',
        'Apply keeps all accepted rows at once or none. Applying the same file again changes nothing.',
      ],
    },
  ],
};

const monitor: Guide = {
  heading: 'For monitors',
  sentence: 'Every subject of the study, to read.',
  parts: [
    {
      heading: 'Subjects',
      steps: [
        'Filter by site and state, and sort by what you want to look at first.',
        'Open a subject to read visits, readings, corrections with their reasons, and where each reading came from.',
      ],
    },
  ],
};

const analyst: Guide = {
  heading: 'For analysts',
  sentence: 'Freeze a cut, look at the dependence, then fit.',
  parts: [
    {
      heading: 'Cuts',
      steps: [
        'A cut holds the readings as they were entered up to the moment of freezing, for visits up to the day you choose. It never changes.',
        'Its file is served byte for byte: the SHA-256 of the download is the one shown.',
      ],
    },
    {
      heading: 'Check',
      steps: [
        'Choose cut, measure and time axis. The check says how many readings hang on how many subjects, and what that does to an analysis.',
        'No fit runs before you have opened the check of the same choice.',
        'The ordinary straight line is locked. A written reason of 20 characters or more opens it, and everything that comes from it carries the stamp “independence not met”.',
      ],
    },
    {
      heading: 'Fit and records',
      steps: [
        'Say first whether the analysis was planned or is exploratory.',
        'Every run leaves a record with its cut, its number among the specifications looked at, and its seed. Signing it is a second act.',
      ],
    },
  ],
};

const administrator: Guide = {
  heading: 'For administrators',
  sentence: 'Accounts and the security log; never study data.',
  parts: [
    {
      heading: 'Accounts',
      steps: [
        'Create an account and hand over its temporary password in person or by telephone. It is shown once.',
        'Disabling an account ends its sessions at once. Nothing the person entered or signed is lost.',
        'A lost password is replaced by a new temporary one.',
      ],
    },
    {
      heading: 'Security log',
      steps: [
        'Sign-ins, refusals and every act on accounts, in a chain that can’t be changed unseen.',
        'An address stands as a fingerprint: equal ones are the same network address.',
      ],
    },
  ],
};

const waiting: Guide = {
  heading: 'For unblinded statisticians, board members and safety officers',
  sentence: 'These roles sign in, and have no pages of their own in this version.',
  parts: [
    {
      heading: 'What is kept from everyone else',
      steps: [
        'The allocation and its key are sealed: no other role, page, file or message holds them.',
        'Urgent findings go by the protocol’s own reporting line.',
      ],
    },
  ],
};

export const helpWords = {
  heading: 'User guide',
  sentence: 'What each role can do here, in the order in which it is usually done.',
  contents: 'Roles',
  cautionsHeading: 'What this is not',
  cautions: [
    'Tetherline is not a medical device and gives no diagnosis or treatment advice. Urgent findings go by the protocol’s own reporting line.',
    'It supports and does not replace the protocol, the analysis plan, the charter and those licensed to decide. Ethics committees, regulators and local law come first.',
    'That nothing is shown does not mean that nothing is wrong.',
  ],
  guides: { everyone, owner, coordinator, monitor, analyst, administrator, waiting },
} as const;
