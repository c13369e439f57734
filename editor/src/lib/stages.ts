import { z } from 'zod';

/** The eight stages of a job, in order. */
export const stages = [
  'enquiry',
  'plan',
  'prove',
  'propose',
  'prepare',
  'install',
  'commission',
  'aftercare',
] as const;
export const stageSchema = z.enum(stages);
export type Stage = z.infer<typeof stageSchema>;

export function stageLabel(stage: Stage): string {
  switch (stage) {
    case 'enquiry':
      return 'Enquiry';
    case 'plan':
      return 'Plan';
    case 'prove':
      return 'Prove';
    case 'propose':
      return 'Propose';
    case 'prepare':
      return 'Prepare';
    case 'install':
      return 'Install';
    case 'commission':
      return 'Commission';
    case 'aftercare':
      return 'Aftercare';
  }
}

/** What a job in this stage is about. */
export function stageMeaning(stage: Stage): string {
  switch (stage) {
    case 'enquiry':
      return 'Walk the site, take photos, note where power is.';
    case 'plan':
      return 'Scale the sheet, place fixtures, draw the cable.';
    case 'prove':
      return 'Bring every fixture into its window.';
    case 'propose':
      return 'Price it and put it to the client.';
    case 'prepare':
      return 'Order, cut, schedule; book the utility locate.';
    case 'install':
      return 'Dig, wire, mount, hook up.';
    case 'commission':
      return 'Measure against the estimate, aim at night, sign off.';
    case 'aftercare':
      return 'Service visits, additions, warranty.';
  }
}

export const stageOptions = stages.map((stage) => ({ value: stage, label: stageLabel(stage) }));
