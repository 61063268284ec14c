/** Words of the API description and its readable page. */
export const apiWords = {
  title: 'Tetherline API',
  description:
    'Everything the pages of Tetherline do, and nothing else. Ids are opaque; moments are in UTC; a refusal is a problem document whose code names its kind.',
  cookie:
    'A short access token, set by signing in and renewed through /api/refresh. No script of a page can read it.',
  idempotency:
    'A key of your own for one intended act: asked again with the same key, it gives the first answer and does nothing twice.',
  answered: 'Answered',
  nothingAnswered: 'Done; nothing is answered',
  refused: 'Refused',
  page: {
    document: 'The same as an OpenAPI 3.1 document',
    contents: 'Contents',
    who: 'Who may',
    entries: 'Entries',
    field: 'Field',
    where: 'Where',
    type: 'Type',
    answer: 'Answer',
    none: 'none',
    optional: 'optional',
    problems: 'Problems',
    code: 'Code',
    status: 'Status',
    sentence: 'Sentence',
    whoWords: {
      public: 'anybody, without signing in',
      'signed in': 'anybody who is signed in',
      administrator: 'administrator of the installation',
    } as Record<string, string>,
  },
} as const;
