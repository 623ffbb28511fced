import type { DemoSite } from './club.ts';

/** Two places that do not exist, hence without coordinates. */
export const demoSites: readonly DemoSite[] = [
  {
    key: 'hilltop',
    facts: {
      name: 'Hilltop field station (invented)',
      latitudeDeg: null,
      longitudeDeg: null,
      elevationM: null,
      note: 'Invented for the demo. Open pasture with two wooden masts.',
      invented: true,
    },
  },
  {
    key: 'boathouse',
    facts: {
      name: 'Boathouse (invented)',
      latitudeDeg: null,
      longitudeDeg: null,
      elevationM: null,
      note: 'Invented for the demo. The club room, with a short tower beside the water.',
      invented: true,
    },
  },
];
