import { defaultSettings, scheduleSchema } from '@lampwright/geometry/plan';
import { z } from 'zod';

/** The regional packs: wording, rules and usual values. */
export const regions = ['us', 'eu', 'uk'] as const;
export const regionSchema = z.enum(regions);
export type Region = z.infer<typeof regionSchema>;

const lengthMeters = z.number().min(0).max(100);
const volts = z.number().positive().max(60);

const aimWindowSchema = z
  .strictObject({ minVolts: volts, maxVolts: volts })
  .refine(({ minVolts, maxVolts }) => minVolts < maxVolts, {
    error: 'The lower volts must be below the higher.',
    path: ['maxVolts'],
  });

function isTimeZone(name: string): boolean {
  try {
    new Intl.DateTimeFormat('en', { timeZone: name });
    return true;
  } catch {
    return false;
  }
}

const fields = {
  units: z.enum(['imperial', 'metric']),
  /** ISO 4217. */
  currency: z.string().regex(/^[A-Z]{3}$/, { error: 'A currency has three capital letters, such as USD.' }),
  lineVolts: z.number().positive().max(600),
  conductorTemperatureC: z.number().min(-60).max(120),
  slackAtFixtureMeters: lengthMeters,
  slackAtTransformerMeters: lengthMeters,
  slackAtJunctionMeters: lengthMeters,
  /** The least distance of a fixture from water before the plan cautions. */
  waterClearanceMeters: lengthMeters,
  /** The share of its rating up to which the company loads a transformer. */
  transformerTargetPercent: z.number().min(1).max(100),
  /** When lights are on, where a plan does not say otherwise. */
  schedule: scheduleSchema,
  /** Of the IANA database: what clocks at its properties show. */
  timeZone: z.string().max(64).refine(isTimeZone, {
    error: 'That is no time zone; one is written as Europe/London or America/New_York.',
  }),
  /** Where the sun sets for properties whose own place is not known; null: nowhere known either. */
  place: z
    .strictObject({ latitude: z.number().min(-90).max(90), longitude: z.number().min(-180).max(180) })
    .nullable(),
  /** The volts that the company aims at, inside of what a fixture is rated for. */
  aim: z.strictObject({ led: aimWindowSchema, halogen: aimWindowSchema }),
};

/** What a company works with where a plan or an item does not say otherwise. */
export const companySettingsSchema = z.strictObject(fields);
export type CompanySettings = z.infer<typeof companySettingsSchema>;

/** Any of them; what is left out stays as it is. */
export const companySettingsEditSchema = z.strictObject(fields).partial();
export type CompanySettingsEdit = z.infer<typeof companySettingsEditSchema>;

/** The words of the region's rules. */
export const regionalWordsSchema = z.strictObject({
  wiringRules: z.string(),
  protectiveDevice: z.string(),
});
export type RegionalWords = z.infer<typeof regionalWordsSchema>;

const iec: RegionalWords = { wiringRules: 'IEC 60364-7-715', protectiveDevice: 'RCD' };
const words: Readonly<Record<Region, RegionalWords>> = {
  us: { wiringRules: 'NEC', protectiveDevice: 'GFCI' },
  eu: iec,
  uk: iec,
};
export const wordsOf = (region: Region): RegionalWords => words[region];

const timeZones: Readonly<Record<Region, string>> = {
  us: 'America/New_York',
  eu: 'Europe/Berlin',
  uk: 'Europe/London',
};
const currencies: Readonly<Record<Region, string>> = { us: 'USD', eu: 'EUR', uk: 'GBP' };

/** What a company of the region begins with. */
export function regionalSettings(region: Region): CompanySettings {
  const { kind: _kind, id: _id, ...plan } = defaultSettings(region === 'us' ? 'us' : 'iec');
  return {
    ...plan,
    units: region === 'us' ? 'imperial' : 'metric',
    currency: currencies[region],
    timeZone: timeZones[region],
    place: null,
    transformerTargetPercent: 80,
    aim: { led: { minVolts: 10.5, maxVolts: 13 }, halogen: { minVolts: 10.8, maxVolts: 12 } },
  };
}

/** A region kept in the database that no pack knows any more counts as the first. */
export const regionOf = (stored: string): Region => regionSchema.catch('us').parse(stored);

/**
 * The settings in force. Only what differs from the region's is stored, so that a company that moves to
 * another region takes the usual values of that region with it.
 */
export function settingsInForce(region: Region, stored: unknown): CompanySettings {
  return { ...regionalSettings(region), ...companySettingsEditSchema.parse(stored) };
}

/** What has to be stored for these settings to be in force. */
export function differencesFrom(region: Region, settings: CompanySettings): CompanySettingsEdit {
  const usual: Record<string, unknown> = regionalSettings(region);
  return Object.fromEntries(
    Object.entries(settings).filter(([key, value]) => JSON.stringify(usual[key]) !== JSON.stringify(value)),
  );
}
