/* The people of the demonstration shop. All invented; the addresses end in a name that no registry gives out. */

/** One password for all of them: the shop runs on the machine of whoever tries it out. */
export const demoPassword = 'a-port-a-day';

export const demoShopName = 'Brackwater Lane Head Works';

export const demoOwner = {
  name: 'Odile Marsh',
  mail: 'odile@brackwater.example',
  password: demoPassword,
  roles: ['owner'],
  pin: null,
} as const;

export const demoSupervisor = {
  name: 'Imre Falk',
  mail: 'imre@brackwater.example',
  password: demoPassword,
  roles: ['supervisor', 'operator'],
  pin: '640217',
} as const;

export const demoTechnician = {
  name: 'Wanda Pike',
  mail: 'wanda@brackwater.example',
  password: demoPassword,
  roles: ['technician', 'operator'],
  pin: '391805',
} as const;

/** Keys at the bench only: a PIN, no mail, no password. */
export const demoOperator = {
  name: 'Tomas Reed',
  mail: null,
  password: null,
  roles: ['operator'],
  pin: '274913',
} as const;
