/** What a visitor of the demo may sign in with. Imports nothing, so that the command line and pages can read it. */
export interface DemoSignIn {
  name: string;
  email: string;
  password: string;
  role: 'operator' | 'coordinator' | 'administrator';
  /** What this person can show, as a phrase after the name. */
  says: string;
}

/** Everybody in the demo has this one. The demo is refused outside of a local trial (`DEMO=yes`). */
export const DEMO_PASSWORD = 'two tides a day';

export const DEMO_SIGN_INS: readonly DemoSignIn[] = [
  {
    name: 'Ylva',
    email: 'ylva@qa1lun.example',
    password: DEMO_PASSWORD,
    role: 'operator',
    says: 'keeper of QA1LUN, with offers waiting for an answer',
  },
  {
    name: 'Edda',
    email: 'edda@qb7tid.example',
    password: DEMO_PASSWORD,
    role: 'operator',
    says: 'keeper of QB7TID, the other side of Ylva’s skeds',
  },
  {
    name: 'Marit',
    email: 'marit@qk3osl.example',
    password: DEMO_PASSWORD,
    role: 'coordinator',
    says: 'net coordinator and keeper of QK3OSL',
  },
  {
    name: 'Osvin',
    email: 'osvin@echotide.example',
    password: DEMO_PASSWORD,
    role: 'administrator',
    says: 'administrator, with no station',
  },
];
