import type { Role } from '../../lib/me';

export function roleLabel(role: Role): string {
  switch (role) {
    case 'owner':
      return 'Owner';
    case 'designer':
      return 'Designer';
    case 'crew':
      return 'Crew';
  }
}

export function roleMeaning(role: Role): string {
  switch (role) {
    case 'owner':
      return 'Everything, the company and its people included.';
    case 'designer':
      return 'Jobs, plans, clients and the catalogue.';
    case 'crew':
      return 'Sees jobs and plans, fills in site walks.';
  }
}

export const roleOptions = (['owner', 'designer', 'crew'] as const).map((value) => ({
  value,
  label: roleLabel(value),
}));
