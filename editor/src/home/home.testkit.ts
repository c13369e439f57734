import type { Combination, Group, Light, Line, SharedPage } from './share';

/** A made-up proposal in every shape that tests need. Sums of a combination are worked out as its parts say. */

const LINK = 'b52c2d3e-0d7a-4a53-8f0e-4b7d6b6f2a01';
export const sampleLinkId = LINK;

const groups: Group[] = [
  {
    id: null,
    name: 'Transformer, timer, wiring base',
    description: '',
    on: true,
    fixtures: 0,
    priceMinor: 98_000,
  },
  { id: 'path', name: 'Path to the patio', description: '', on: true, fixtures: 5, priceMinor: 124_000 },
  { id: 'bed', name: 'Shrub bed', description: '', on: true, fixtures: 4, priceMinor: 111_000 },
  {
    id: 'wall',
    name: 'Wall and tree',
    description: 'Light on the brick and in the crown of the maple.',
    on: false,
    fixtures: 4,
    priceMinor: 129_000,
  },
];

const taxable: Readonly<Record<string, number>> = { base: 40_000, path: 60_000, bed: 45_000, wall: 55_000 };

function combination(ids: readonly string[]): Combination {
  const taken = groups.filter(({ id }) => id === null || ids.includes(id));
  const subtotalMinor = taken.reduce((sum, { priceMinor }) => sum + priceMinor, 0);
  const taxableMinor = taken.reduce((sum, { id }) => sum + (taxable[id ?? 'base'] ?? 0), 0);
  const taxMinor = Math.round(taxableMinor * 0.06);
  const totalMinor = subtotalMinor + taxMinor;
  const depositMinor = Math.round(totalMinor * 0.3);
  const wallWithoutBed = ids.includes('wall') && !ids.includes('bed');
  return {
    groups: [...ids],
    subtotalMinor,
    discountMinor: 0,
    taxableMinor,
    taxMinor,
    totalMinor,
    stages: [
      {
        id: 'deposit',
        name: 'Deposit',
        due: 'approval',
        percent: 30,
        amountMinor: depositMinor,
        capped: false,
      },
      {
        id: 'balance',
        name: 'Balance',
        due: 'finish',
        percent: null,
        amountMinor: totalMinor - depositMinor,
        capped: false,
      },
    ],
    offerable: !wallWithoutBed,
    reason: wallWithoutBed
      ? 'Without the shrub bed the lights on the wall would be too bright for their lamps. Please keep both, or neither.'
      : '',
  };
}

const sets = [
  ['path', 'bed'],
  [],
  ['path'],
  ['bed'],
  ['wall'],
  ['path', 'wall'],
  ['bed', 'wall'],
  ['path', 'bed', 'wall'],
];

const light = (
  recordId: string,
  tag: string,
  groupId: string | null,
  x: number,
  y: number,
  of: Pick<Light, 'kind' | 'name' | 'lights'>,
): Light => ({
  recordId,
  sheetId: 'photo',
  x,
  y,
  tag,
  initial: tag.slice(0, 1),
  quantity: 1,
  groupId,
  technical: { volts: 11.6, watts: 3, lumens: 180, beamDegrees: 120, cctKelvin: 2700 },
  ...of,
});

const path = {
  kind: 'path',
  name: 'Brass path light, 3 W',
  lights: 'Lights the stepping stones to the patio.',
};
const up = { kind: 'up', name: 'Brass up-light, 5 W', lights: 'Lights the shrubs from below.' };
const wash = { kind: 'wall-wash', name: 'Wall wash, 6 W', lights: 'Lights the brick beside the patio door.' };

const lights: Light[] = [
  light('p1', 'P1', 'path', 1480, 1560, path),
  light('p2', 'P2', 'path', 1380, 1470, path),
  light('p3', 'P3', 'path', 1560, 1390, path),
  light('p4', 'P4', 'path', 1370, 1320, path),
  light('p5', 'P5', 'path', 1560, 1260, path),
  light('u1', 'U1', 'bed', 160, 1190, up),
  light('u2', 'U2', 'bed', 330, 1160, up),
  light('u3', 'U3', 'bed', 2110, 1080, up),
  light('u4', 'U4', 'bed', 2260, 1120, up),
  light('w1', 'F1', 'wall', 690, 1060, wash),
  light('w2', 'F2', 'wall', 1760, 1060, wash),
  light('w3', 'F3', 'wall', 1900, 1060, wash),
  light('w4', 'U5', 'wall', 2330, 900, { ...up, lights: 'Lights the crown of the maple.' }),
];

const line = (
  key: string,
  groupId: string | null,
  name: string,
  quantity: number,
  priceMinor: number,
): Line => ({
  key,
  groupId,
  section: 'fixtures',
  kind: 'material',
  name,
  quantity,
  unit: 'each',
  priceMinor,
});

const lines: Line[] = [
  line('t', null, 'Transformer, 300 VA', 1, 52_000),
  { ...line('cable', null, 'Cable, 12 gauge', 210, 33_000), unit: 'foot' },
  { ...line('aim', null, 'Aiming visit at night', 1, 13_000), unit: 'visit', kind: 'labour' },
  line('p', 'path', 'Brass path light, 3 W', 5, 84_000),
  { ...line('pl', 'path', 'Placing and wiring path lights', 5, 40_000), kind: 'labour' },
  line('u', 'bed', 'Brass up-light, 5 W', 4, 111_000),
  line('w', 'wall', 'Wall wash, 6 W', 3, 129_000),
];

export const sampleQuestion: SharedPage['questions'][number] = {
  id: 'd3b0b6a4-8a77-4c6f-9d1b-0b6f6f7f0001',
  recordId: 'p3',
  sheetId: null,
  x: null,
  y: null,
  revision: 1,
  resolvedAt: null,
  messages: [
    {
      id: 'd3b0b6a4-8a77-4c6f-9d1b-0b6f6f7f0002',
      side: 'homeowner',
      authorName: 'Dana Whitlock',
      text: 'Can this one stand a little further from the lawn edge? The mower comes close.',
      at: '2027-01-04T17:20:00.000Z',
    },
    {
      id: 'd3b0b6a4-8a77-4c6f-9d1b-0b6f6f7f0003',
      side: 'company',
      authorName: 'Mara Ellery',
      text: 'Yes, a foot into the bed works. I will move it in the plan.',
      at: '2027-01-05T09:02:00.000Z',
    },
  ],
};

export const samplePage = (over: Partial<SharedPage> = {}): SharedPage => ({
  state: 'open',
  recipient: 'Dana Whitlock',
  revisionId: '5f0d6f4c-7c5e-4a8e-9a1e-1c2f3d4e5f60',
  hash: 'a'.repeat(64),
  document: {
    form: 1,
    number: 1042,
    revision: 1,
    changes: null,
    madeAt: '2027-01-02T10:00:00.000Z',
    validUntil: '2027-01-31',
    currency: 'USD',
    locale: 'en-US',
    region: 'us',
    units: 'imperial',
    company: {
      name: 'Fernhollow Outdoor Lighting',
      email: 'office@fernhollow.example',
      phone: '(555) 010-0142',
      address: '12 Mill Lane\nMarlow Bend',
      licence: 'LV-20418',
    },
    client: {
      name: 'Dana Whitlock',
      email: 'dana@home.example',
      phone: '',
      address: '4 Harrow Bank, Marlow Bend',
    },
    job: { id: 'job', name: 'Back garden', property: 'Harrow Bank' },
    sheets: [{ id: 'photo', name: 'Back garden', view: 'photo', widthPx: 2400, heightPx: 1600 }],
    lights,
    price: {
      groups,
      lines,
      discountName: '',
      tax: { name: 'Sales tax', jurisdiction: '', percent: 6 },
      stages: [
        { id: 'deposit', name: 'Deposit', due: 'approval', percent: 30 },
        { id: 'balance', name: 'Balance', due: 'finish', percent: 70 },
      ],
      combinations: sets.map(combination),
    },
    words: {
      scope: 'We set the lights as shown, lay the cable and aim every light with you after dark.',
      exclusions: 'Line-voltage work, and repairs of irrigation that nobody has marked.',
      timeline: 'Two days in the second half of March.\n\nThe aiming visit follows within two weeks.',
      locate: 'We book the utility locate, and dig only after it.',
      warranty: 'Fixtures ten years, lamps three, our own work two.',
      terms: 'The deposit books the dates.\n\nThe balance is due at sign-off.',
      cancellation: 'You may cancel within three business days of signing, without giving a reason.',
    },
    cautions: [
      'Line-voltage work belongs to a licensed electrician.',
      'Lamps get hot: keep leaves and mulch clear.',
    ],
    acceptedFaults: [],
  },
  pictures: [
    {
      sheetId: 'photo',
      url: `/api/share/${LINK}/pictures/photo`,
      light: { url: `/api/share/${LINK}/pictures/photo?width=1000`, media: '(max-width: 719px)' },
      widthPx: 1600,
      heightPx: 1067,
      night: { zones: 2 },
    },
  ],
  differences: null,
  approval: null,
  decline: null,
  sentences: {
    approval: 'I approve proposal 1042, version 1, with the parts and the total shown above.',
    consent: 'I agree to sign and to receive these documents electronically.',
  },
  questions: [],
  dues: [],
  papers: [{ id: 'proposal', name: 'Proposal 1042', url: `/api/share/${LINK}/papers/proposal` }],
  ...over,
});

export const sampleDue = (over: Partial<SharedPage['dues'][number]> = {}): SharedPage['dues'][number] => ({
  id: 'c1d2e3f4-0000-4000-8000-000000000001',
  name: 'Deposit',
  due: 'approval',
  outstandingMinor: 102_510,
  amountMinor: 102_510,
  paidMinor: 0,
  requested: true,
  payable: true,
  pending: false,
  ...over,
});

export const approvedPage = (over: Partial<SharedPage> = {}): SharedPage =>
  samplePage({
    state: 'approved',
    approval: {
      typedName: 'Dana Whitlock',
      at: '2027-01-06T18:30:00.000Z',
      groups: ['path', 'bed'],
      totalMinor: 341_700,
      revision: 1,
    },
    dues: [
      sampleDue(),
      sampleDue({
        id: 'c1d2e3f4-0000-4000-8000-000000000002',
        name: 'Balance',
        due: 'finish',
        amountMinor: 239_190,
        outstandingMinor: 239_190,
        requested: false,
        payable: false,
      }),
    ],
    ...over,
  });

/** A second version after an approval. */
export const changedPage = (over: Partial<SharedPage> = {}): SharedPage => {
  const page = approvedPage({ state: 'open' });
  return {
    ...page,
    document: {
      ...page.document,
      revision: 2,
      changes: { revision: 1, hash: 'b'.repeat(64), totalMinor: 320_000 },
    },
    differences: {
      added: [{ recordId: 'u4', tag: 'U4', name: 'Brass up-light, 5 W' }],
      removed: [{ recordId: 'gone', tag: 'B1', name: 'Bollard, 7 W' }],
      moved: [{ recordId: 'p3', tag: 'P3', name: 'Brass path light, 3 W', meters: 0.31 }],
      replaced: [{ recordId: 'u1', tag: 'U1', was: 'Brass up-light, 3 W', now: 'Brass up-light, 5 W' }],
      lines: [
        { name: 'Cable, 12 gauge', wasQuantity: 190, nowQuantity: 210, unit: 'foot', byMinor: 2000 },
        { name: 'Bollard, 7 W', wasQuantity: 1, nowQuantity: 0, unit: 'each', byMinor: null },
      ],
      wasTotalMinor: 320_000,
      nowTotalMinor: 341_700,
    },
    ...over,
  };
};
