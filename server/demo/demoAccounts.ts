import type { ProjectRole } from '../../shared/schemas/account.js';

export interface DemoAccount {
  /** As shown beside the account on the sign-in page. */
  role: string;
  name: string;
  email: string;
  password: string;
  isAdmin: boolean;
  /** Roles in the demo project. */
  roles: ProjectRole[];
}

/** People of the invented survey; they exist in demo installations only, where their sign-ins are public on purpose. */
export const demoAccounts: readonly DemoAccount[] = [
  {
    role: 'Analyst',
    name: 'Ines Corvane',
    email: 'ines@marram.example',
    password: 'gravel-tern-pump-41',
    isAdmin: false,
    roles: ['analyst'],
  },
  {
    role: 'Reviewer',
    name: 'Tomas Helder',
    email: 'tomas@marram.example',
    password: 'heron-sluice-weir-52',
    isAdmin: false,
    roles: ['reviewer'],
  },
  {
    role: 'QA manager',
    name: 'Yara Quist',
    email: 'yara@marram.example',
    password: 'plover-dune-gate-63',
    isAdmin: false,
    roles: ['qaManager'],
  },
  {
    role: 'Administrator',
    name: 'Ove Brandt',
    email: 'ove@marram.example',
    password: 'marsh-lantern-key-74',
    isAdmin: true,
    roles: ['analyst', 'reviewer', 'qaManager'],
  },
];
