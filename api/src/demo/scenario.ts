import { usualTexts } from '../modules/proposals/usual-texts.js';
import type { PlanBuilder } from './plan-builder.js';
import { drawHarrowBank } from './plans/harrow-bank.js';
import { drawSandpiperRow } from './plans/sandpiper-row.js';
import { type DemoPricing, harrowBankPricing, sandpiperRowPricing } from './prices/job-pricing.js';

/**
 * The demo company: an invented firm in an invented town, whose people and clients are invented too. Ids are
 * fixed, so that loading it again finds what is there already.
 */
const id = (n: number): string => `fe4110ca-0000-4000-8000-${String(n).padStart(12, '0')}`;

export const DEMO_PASSWORD = 'fernhollow-demo';

/** Where the invented town is taken to lie, for its sunsets. */
const marlowBend = { latitude: 40.2, longitude: -75 };

export const demoCompany = {
  id: id(1),
  name: 'Fernhollow Outdoor Lighting',
  region: 'us',
  settings: { place: marlowBend },
};

export const demoPeople = [
  { id: id(11), name: 'Linnea Marsh', email: 'owner@fernhollow.example', role: 'owner' },
  { id: id(12), name: 'Corin Aldous', email: 'designer@fernhollow.example', role: 'designer' },
  { id: id(13), name: 'Bram Tolliver', email: 'crew@fernhollow.example', role: 'crew' },
] as const;
/** Who set the prices. */
export const demoOwner = demoPeople[0];
/** Who drew the plans. */
export const demoDesigner = demoPeople[1];

export const demoClients = [
  { id: id(21), name: 'Maren Holloway', email: 'maren.holloway@example.com', phone: '555-0142' },
  { id: id(22), name: 'Tobias and Ines Calder', email: 'calder@example.org', phone: '555-0117' },
  { id: id(23), name: 'Odette Farrow', email: 'odette.farrow@example.com', phone: null },
];

export const demoProperties = [
  {
    id: id(31),
    clientId: id(21),
    name: 'Harrow Bank',
    address: '7 Harrow Bank, Marlow Bend',
    region: 'Marlow Bend',
    latitude: 40.2071,
    longitude: -75.0124,
    accessNotes: 'Side gate on the right, not locked. A friendly dog is indoors by nine.',
  },
  {
    id: id(32),
    clientId: id(22),
    name: 'Sandpiper Row',
    address: 'Lot 14, Sandpiper Row, Marlow Bend',
    region: 'Marlow Bend',
    latitude: 40.1938,
    longitude: -74.9877,
    accessNotes: 'Park on the drive. The pool cover stays on until May.',
  },
  {
    id: id(33),
    clientId: id(23),
    name: 'Weir Cottage',
    address: '2 Weir Lane, Marlow Bend',
    region: 'Marlow Bend',
    latitude: 40.2016,
    longitude: -75.0203,
    accessNotes: '',
  },
];

const answered = { associationRules: '', permits: '', notes: '' };

export const demoJobs = [
  {
    id: id(41),
    propertyId: id(31),
    name: 'Harrow Bank, rear garden',
    stage: 'prove',
    existingSystem: false,
    notes: 'Wants the path safe to walk, the shrubs and the big tree lit, and the pond left dark.',
    siteWalk: {
      lineVoltsUnderLoad: 122,
      outletLocation: 'House wall, right of the patio door, with an in-use cover',
      circuitRatingAmps: 15,
      otherLoadsOnCircuit: 'Patio fan',
      protected: 'yes',
      existingTransformer: 'None',
      existingCable: 'None',
      irrigation: { present: 'yes', note: 'Four zones; the valve box is behind the shrub bed' },
      gas: { present: 'no', note: '' },
      petFence: { present: 'yes', note: 'Along the right fence, a hand deep' },
      ...answered,
      associationRules: 'Lights out by 23:00.',
    },
  },
  {
    id: id(42),
    propertyId: id(32),
    name: 'Sandpiper Row, whole lot',
    stage: 'plan',
    existingSystem: true,
    notes: 'The path lamps of the front walk are the old halogen ones and stay for now.',
    siteWalk: {
      lineVoltsUnderLoad: 118,
      outletLocation: 'Rear wall of the west wing',
      circuitRatingAmps: 20,
      otherLoadsOnCircuit: 'Pool pump timer',
      protected: 'yes',
      existingTransformer: 'A 200 VA unit with one tap, to be replaced',
      existingCable: '10 AWG to the front walk, sound',
      irrigation: { present: 'unknown', note: '' },
      gas: { present: 'yes', note: 'Enters at the garage; keep to the west side' },
      petFence: { present: 'no', note: '' },
      ...answered,
      permits: 'Town asks for a drawing with the distances to the pool.',
    },
  },
  {
    id: id(43),
    propertyId: id(33),
    name: 'Weir Cottage, front walk',
    stage: 'enquiry',
    existingSystem: false,
    notes: '',
    siteWalk: {},
  },
] as const;

export interface DemoSheet {
  readonly id: string;
  readonly jobId: string;
  readonly name: string;
  readonly view: 'photo' | 'plan';
  /** In ./files. */
  readonly file: string;
  readonly draw: (plan: PlanBuilder) => void;
  readonly pricing: DemoPricing;
}

export const demoSheets: readonly DemoSheet[] = [
  {
    id: id(51),
    jobId: id(41),
    name: 'Yard photo',
    view: 'photo',
    file: 'yard-photo.jpg',
    draw: drawHarrowBank,
    pricing: harrowBankPricing,
  },
  {
    id: id(52),
    jobId: id(42),
    name: 'Plot plan',
    view: 'plan',
    file: 'plot-plan.pdf',
    draw: drawSandpiperRow,
    pricing: sandpiperRowPricing,
  },
];

/** How homeowners reach the company; the words are the usual ones. */
export const demoTexts = {
  ...usualTexts('us'),
  company: {
    email: 'office@fernhollow.example',
    phone: '555-0100',
    address: '3 Mill Yard, Marlow Bend',
    licence: 'Marlow Bend contractor no. 20-417',
  },
};
