import type { CompanyKind, Method, Role } from '@kerfyard/common/people';

/** Everybody in the demo is invented, and so are their companies. */
export interface DemoPerson {
  key: string;
  name: string;
  role: Role;
  setAsideLimitCents?: number;
}

export interface DemoCompany {
  key: string;
  kind: CompanyKind;
  name: string;
  phone: string;
  /** The first is the owner, who signs the company up. */
  people: readonly DemoPerson[];
  yard?: { zip: string; lat: number; lon: number };
  serviceRadiusMi?: number;
  methods?: readonly Method[];
  crews?: readonly string[];
  trucks?: readonly string[];
  /** Has finished its payout set-up. */
  isPaidOut?: boolean;
  hasRateCard?: boolean;
}

export const DEMO_PASSWORD = 'chalk line at dawn';

export const demoCompanies: readonly DemoCompany[] = [
  {
    key: 'halden',
    kind: 'general_contractor',
    name: 'Halden Pike Builders',
    phone: '614 555 0142',
    people: [
      { key: 'imani', name: 'Imani Achterberg', role: 'owner' },
      { key: 'teodor', name: 'Teodor Lisk', role: 'accounts', setAsideLimitCents: 5_000_000 },
      { key: 'wren', name: 'Wren Castellane', role: 'manager' },
      { key: 'otis', name: 'Otis Varga', role: 'field' },
    ],
  },
  {
    key: 'corvane',
    kind: 'general_contractor',
    name: 'Corvane Civil Works',
    phone: '419 555 0117',
    people: [
      { key: 'saoirse', name: 'Saoirse Bellweather', role: 'owner' },
      { key: 'ruben', name: 'Ruben Oyelaran', role: 'manager' },
    ],
  },
  {
    key: 'tamsin',
    kind: 'general_contractor',
    name: 'Tamsin Row Construction',
    phone: '216 555 0188',
    people: [{ key: 'delphine', name: 'Delphine Marsh', role: 'owner' }],
  },
  {
    key: 'quillback',
    kind: 'cutting_contractor',
    name: 'Quillback Concrete Cutting',
    phone: '614 555 0163',
    people: [
      { key: 'marisol', name: 'Marisol Ferro', role: 'owner' },
      { key: 'dag', name: 'Dag Hollis', role: 'manager' },
      { key: 'beto', name: 'Beto Arroyo', role: 'field' },
      { key: 'nell', name: 'Nell Ashgrove', role: 'accounts' },
    ],
    yard: { zip: '43207', lat: 39.9046, lon: -82.9703 },
    serviceRadiusMi: 180,
    methods: ['flat_saw', 'wall_saw', 'hand_saw', 'core_drill', 'joint_saw', 'chain_saw', 'ring_saw'],
    crews: ['Beto and Lark', 'Wall saw crew'],
    trucks: ['Truck 3, flat saw', 'Truck 7, wall saw'],
    isPaidOut: true,
    hasRateCard: true,
  },
  {
    key: 'ferrow',
    kind: 'cutting_contractor',
    name: 'Ferrow and Daughters Sawing',
    phone: '937 555 0129',
    people: [{ key: 'agnes', name: 'Agnes Ferrow', role: 'owner' }],
    yard: { zip: '45402', lat: 39.7563, lon: -84.1895 },
    serviceRadiusMi: 150,
    methods: ['flat_saw', 'hand_saw', 'core_drill', 'joint_saw', 'wall_saw', 'chain_saw', 'ring_saw'],
    crews: ['Agnes and Posy'],
    trucks: ['The green truck'],
    isPaidOut: true,
  },
  {
    key: 'lantern',
    kind: 'cutting_contractor',
    name: 'Lantern Street Coring',
    phone: '216 555 0154',
    people: [{ key: 'ezra', name: 'Ezra Quist', role: 'owner' }],
    yard: { zip: '44114', lat: 41.5064, lon: -81.6743 },
    serviceRadiusMi: 160,
    methods: ['core_drill', 'stitch_drill', 'wall_saw', 'hand_saw', 'flat_saw', 'chain_saw', 'ring_saw'],
    crews: ['Night crew', 'Day crew'],
    trucks: ['Coring van'],
  },
  {
    key: 'hollowell',
    kind: 'cutting_contractor',
    name: 'Hollowell Slab and Wall',
    phone: '740 555 0171',
    people: [{ key: 'june', name: 'June Hollowell', role: 'owner' }],
    yard: { zip: '43302', lat: 40.5876, lon: -83.1271 },
    serviceRadiusMi: 200,
    methods: ['flat_saw', 'wall_saw', 'core_drill', 'joint_saw', 'hand_saw', 'chain_saw', 'ring_saw'],
    crews: ['First crew'],
    trucks: ['Truck 1'],
  },
];

export const demoStaff = { key: 'staff', name: 'Petra Nightingale' } as const;

export const emailOf = (key: string): string => `${key}@demo.kerfyard.example`;
