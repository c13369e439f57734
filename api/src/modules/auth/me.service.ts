import { Inject, Injectable } from '@nestjs/common';
import { MembershipsRepository } from '../../access/memberships.repository.js';
import { UsersRepository } from '../../access/users.repository.js';
import { notSignedIn } from '../../http/app-error.js';
import { CompaniesRepository } from '../companies/companies.repository.js';
import { regionOf, settingsInForce, wordsOf } from '../companies/settings.js';
import { type Me, preferencesSchema } from './auth.dto.js';

@Injectable()
export class MeService {
  constructor(
    @Inject(UsersRepository) private readonly users: UsersRepository,
    @Inject(MembershipsRepository) private readonly memberships: MembershipsRepository,
    @Inject(CompaniesRepository) private readonly companies: CompaniesRepository,
  ) {}

  /** @param activeId the session's company; whether the person is a member is looked up here. */
  async describe(userId: string, activeId: string | null): Promise<Me> {
    const user = await this.users.find(userId);
    if (!user) throw notSignedIn();
    const mine = await this.memberships.listOfUser(userId);
    const active = mine.find(({ id }) => id === activeId);
    const company = active ? await this.companies.find(active.id) : null;
    const region = regionOf(company?.region ?? 'us');
    const settings = settingsInForce(region, company?.settings ?? {});
    return {
      user: {
        id: user.id,
        name: user.name,
        email: user.email,
        preferences: {
          units: settings.units,
          theme: 'system',
          ...preferencesSchema.partial().parse(user.preferences),
        },
      },
      company: company
        ? { id: company.id, name: company.name, region, settings, words: wordsOf(region) }
        : null,
      role: company && active ? active.role : null,
      companies: mine,
    };
  }
}
