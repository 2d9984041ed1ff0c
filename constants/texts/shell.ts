/** Words of the frame around every screen, of the session's dialogs and of the account page. */
export const shellText = {
  product: 'Driftless',
  claim: 'A price you can prove.',
  navigation: 'Main',
  elsewhere: 'Elsewhere on this desk',
  items: {
    ticket: 'Ticket',
    quotes: 'Quotes',
    books: 'Books',
    'market-data': 'Market data',
    policies: 'Policy',
    runs: 'Runs',
    studies: 'Studies',
    history: 'History',
    chain: 'Chain',
    people: 'People',
    changes: 'Changes',
    more: 'More',
  },
  desk: 'Desk',
  switchDesk: (name: string) => `Desk ${name}. Switch desk.`,
  chooseDesk: 'Choose a desk',
  currentDesk: 'open now',
  suspended: 'suspended',
  roles: {
    analyst: 'Analyst',
    'desk-head': 'Desk head',
    'risk-officer': 'Risk officer',
    auditor: 'Auditor',
  },
  opening: 'Opening Driftless',
  notPermittedTitle: 'Not part of your role here',
  notPermitted: (act: string, role: string) =>
    `“${act}” is not among what a ${role.toLowerCase()} may do on this desk. The desk head can grant it.`,
  lostTitle: 'What you may do on this desk was changed meanwhile',
  lost: (sentences: readonly string[]) =>
    `Refused, and no longer offered: ${sentences.join('; ')}. The desk head can say why.`,
  lostRead: 'I have read it',
  notMemberTitle: 'Not your desk',
  notMember: 'You are not a member of this desk. Its head or the firm’s administrator can add you.',
  suspendedTitle: 'Your membership is suspended',
  suspendedBody: 'Nothing of this desk is open to you now. The desk head can say why.',
  noDeskTitle: 'No desk yet',
  noDesk:
    'You are signed in, but no member of any desk. The firm’s administrator adds people to desks.',
  toStart: 'Go to the start',
  notFoundTitle: 'There is no such page',
  notFound: 'The address may be mistyped, or the record may belong to another desk.',
} as const;

export const signInText = {
  title: 'Sign in',
  sentence:
    'Driftless prices an option by three independent routes and shows how far each can be trusted.',
  caution:
    'A model value is indicative and no investment advice. Firm policy, local regulation and licensed practice decide.',
  email: 'E-mail',
  password: 'Password',
  act: 'Sign in',
  wrongPassword: 'The password is not right.',
  again: 'Sign in again',
  againBody: 'Your session has ended. What you typed is still here, and is sent once you are back.',
  someoneElse: 'Not you? Leave this page',
  confirm: 'Confirm it is you',
  confirmBody: 'This act is binding and recorded. Enter your password to go on.',
  confirmAct: 'Confirm',
} as const;

export const moreText = {
  title: 'More',
  you: 'You',
  signedInAs: 'Signed in as',
  role: (role: string, desk: string) => `${role} on ${desk}`,
  signOut: 'Sign out',
  signOutFailed: 'The server does not answer, so you are still signed in. Try again in a moment.',
  desks: 'Desks',
  look: 'Look',
  schemes: { system: 'as the device', light: 'light', dark: 'dark' },
  scheme: 'Colours',
  api: 'For programs',
  apiBody: 'Everything that the screens do goes through one documented interface.',
  apiLink: 'Open the interface’s description',
  mayTitle: 'What you may do here',
  conventions: 'Conventions',
  cautions: 'Cautions',
} as const;

export const conventionTexts: readonly { term: string; meaning: string }[] = [
  { term: 'Value', meaning: 'per one unit of the underlying, in the quote currency' },
  { term: 'Time', meaning: 'years to the expiry instant, ACT/365 Fixed' },
  { term: 'Rate and yield', meaning: 'continuously compounded, per year, shown in percent' },
  { term: 'Volatility', meaning: 'per square root of a year, shown in percent' },
  { term: 'Sign', meaning: 'what the desk holds is positive, what it owes negative' },
  {
    term: 'Expiry',
    meaning: 'at the desk’s cut-off on the day of expiry, in the desk’s time zone',
  },
  { term: '±', meaning: 'a route’s own estimate of its error, not a confidence in the model' },
  { term: 'Tolerance', meaning: 'how far routes may lie apart and still agree; the desk sets it' },
];

export const cautionTexts: readonly string[] = [
  'A model value is indicative. It is neither an offer nor investment advice.',
  'One volatility per strike and expiry, lognormal moves and no jumps are assumptions.',
  '“Routes agree” says that the sums are right, not that the model is.',
  'A value outside its method’s range, or whose routes disagree, is marked wherever it appears.',
  'Firm policy, local regulation and licensed practice decide.',
];
