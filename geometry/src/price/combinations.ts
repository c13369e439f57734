import type { JobPricing } from './job-pricing.js';

/** Every set of groups that could be taken, each in the order of the groups; first the one as offered. */
export function combinationsOf(pricing: Pick<JobPricing, 'groups'>): string[][] {
  const { groups } = pricing;
  const offered = groups.reduce((bits, group, i) => (group.on ? bits | (1 << i) : bits), 0);
  const all = Array.from({ length: 1 << groups.length }, (_, bits) => bits);
  all.sort((a, b) => Number(b === offered) - Number(a === offered));
  return all.map((bits) => groups.flatMap(({ id }, i) => ((bits >> i) & 1 ? [id] : [])));
}
