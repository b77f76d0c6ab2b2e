/** One person the stand-in can sign in. */
export type StandInPerson = {
  readonly sub: string;
  readonly name: string;
  readonly email: string;
  /** `role` (every site) or `role@site`. */
  readonly roles: readonly string[];
  /** What the person does, in a few words, for the page where one is chosen. */
  readonly note: string;
};

function person(sub: string, name: string, roles: readonly string[], note: string): StandInPerson {
  return { sub, name, email: `${sub}@larkfen.example`, roles, note };
}

/** The invented staff of Larkfen Cells. Nobody here exists. */
export const demoPeople: readonly StandInPerson[] = [
  person('hallowe', 'B. Hallowe', ['engineer@larkfen'], 'asks for slots, reads the evidence'),
  person('osmery', 'T. Osmery', ['scheduler'], 'turns requests into bookings'),
  person('fennick', 'I. Fennick', ['metrologist'], 'keeps the instruments in date'),
  person('dunmarle', 'P. Dunmarle', ['metrologist'], 'the second signature'),
  person('marwhin', 'S. Marwhin', ['manager'], 'approves, closes, sets policy'),
  person('yelland', 'A. Yelland', ['safety'], 'releases cell types, sets limits'),
  person('quenby', 'L. Quenby', ['auditor'], 'reads everything, changes nothing'),
  person('tarn', 'R. Tarn', ['admin'], 'people, sites, roles'),
  person('crandle', 'E. Crandle', ['engineer@larkfen'], 'works on other projects'),
  person('vessant', 'N. Vessant', ['engineer@otterholm'], 'asks for slots at Otterholm'),
];
