import type { Role } from '../common/roles';

export interface DemoAccount {
  readonly displayName: string;
  readonly email: string;
  readonly password: string;
  readonly roles: readonly [Role, ...Role[]];
}

export const DEMO_BENCH_NAME = 'Lantern Yard';

/** Invented people. Their passwords are public: the configuration allows the demo on this machine's own address only. */
export const DEMO_ACCOUNTS: readonly DemoAccount[] = [
  {
    displayName: 'Jonah Pell',
    email: 'jonah@lantern-yard.example',
    password: 'rain on the slate roof',
    roles: ['reviewer', 'technician'],
  },
  {
    displayName: 'Ilse Varga',
    email: 'ilse@lantern-yard.example',
    password: 'four wires and a lamp',
    roles: ['technician'],
  },
  {
    displayName: 'Marit Oskam',
    email: 'marit@lantern-yard.example',
    password: 'keys on the third hook',
    roles: ['administrator'],
  },
  {
    displayName: 'Tamsin Roe',
    email: 'tamsin@hill-end.example',
    password: 'the ferry leaves at noon',
    roles: ['peer'],
  },
];
