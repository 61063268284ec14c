/** The invented people of the demo. The eight with passwords are printed by `npm start`. */
import accounts from './accounts.json' with { type: 'json' };

export type DemoRole =
  | 'owner'
  | 'coordinator'
  | 'monitor'
  | 'analyst'
  | 'unblinded statistician'
  | 'board member'
  | 'safety officer'
  | 'administrator';

export type DemoPerson = { role: DemoRole; email: string; password: string; name: string };

const NAMES: Record<DemoRole, string> = {
  owner: 'Oona Farrow',
  coordinator: 'Carrick Dale',
  monitor: 'Mirrin Holt',
  analyst: 'Anwen Sedge',
  'unblinded statistician': 'Ulric Thorne',
  'board member': 'Bryony Wick',
  'safety officer': 'Saffi Mere',
  administrator: 'Adair Locke',
};

export const demoPeople: DemoPerson[] = accounts.map((account) => {
  const role = account.role as DemoRole;
  return { ...account, role, name: NAMES[role] };
});
