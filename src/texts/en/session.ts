export const session = {
  title: (organisation: string) => `The leakage-current desk of ${organisation}`,
  lead: 'Book a hold that can be trusted: every instrument in date through the end, every chamber shown to be steady, every slot long enough to settle.',
  signIn: (organisation: string) => `Sign in with your ${organisation} account`,
  whereTo: 'You will be taken to the sign-in page of your organisation and back.',
  lookRound: 'Or look round as',
  columns: { role: 'Role', name: 'Person', does: 'What they do' },
  demo: 'Demo people and demo data. Nothing here is real.',
  match: 'voltage match',
  settled: 'settled',
  informs:
    'Millpond informs. Local codes, the site’s own safety rules, the cell maker’s limits and licensed practice decide.',
  help: 'Help',
} as const;
