import { buffer } from 'node:stream/consumers';
import type { LightSource, NightScene } from '@lampwright/geometry/light';
import { renderNight } from '@lampwright/geometry/night';
import { Inject, Injectable, Logger } from '@nestjs/common';
import sharp from 'sharp';
import type { NightPicture } from '../../paper/night-picture.js';
import { ObjectStorage } from '../../ports/storage/storage.js';
import { nightScenesOf } from './night.js';
import { nightKeyOf } from './pictures.js';
import { picturesOf, type ShownRevision } from './proposal-store.js';

/** Degrees: from here down there is no daylight left (the end of astronomical twilight). */
const FULL_NIGHT = -18;
/** Of the longer side: a page's width at 200 dots per inch. */
const LONGEST_PX = 2000;
const QUALITY = 82;

type Pictures = ReadonlyMap<string, Buffer>;
type Taken = ReadonlySet<string>;

/**
 * The garden of a revision by night, sheet by sheet, for paper. A picture takes seconds and some hundred megabytes,
 * so that only the worker makes any; one that can't be made is left out and logged: the proposal goes without it.
 */
@Injectable()
export class NightPictures {
  private readonly logger = new Logger('proposals');

  constructor(@Inject(ObjectStorage) private readonly storage: ObjectStorage) {}

  /** As the revision is offered; each is stored beside the day picture that it is made from. */
  async keep(shown: ShownRevision, pictures: Pictures): Promise<NightPicture[]> {
    const taken = offered(shown);
    return this.each(shown, pictures, taken, async (scene, key, day) => {
      const picture = await this.rendered(shown, scene, day, taken);
      if (picture) await this.storage.put(key, picture, 'image/jpeg');
      return picture;
    });
  }

  /**
   * As the revision was approved: the stored ones, or others where other groups were taken. Of a sheet that was
   * offered without one there is none.
   */
  async asApproved(
    shown: ShownRevision,
    pictures: Pictures,
    groups: readonly string[],
  ): Promise<NightPicture[]> {
    const taken = new Set(groups);
    const asOffered = isSame(offered(shown), taken);
    return this.each(shown, pictures, taken, async (scene, key, day) => {
      const stored = await this.storage.get(key);
      if (!stored) return null;
      const kept = await buffer(stored.stream);
      return asOffered ? kept : this.rendered(shown, scene, day, taken);
    });
  }

  /** One after the other, for each sheet on which a light of these groups is lit. */
  private async each(
    shown: ShownRevision,
    pictures: Pictures,
    taken: Taken,
    make: (scene: NightScene, key: string, day: Buffer) => Promise<Buffer | null>,
  ): Promise<NightPicture[]> {
    const keys = picturesOf(shown.row);
    const nights: NightPicture[] = [];
    for (const scene of this.scenesOf(shown)) {
      const [key, day] = [keys.get(scene.sheetId), pictures.get(scene.sheetId)];
      if (key === undefined || !day || !scene.sources.some((source) => isLit(source, taken))) continue;
      const picture = await make(scene, nightKeyOf(key), day);
      if (picture) nights.push({ scene, picture });
    }
    return nights;
  }

  private scenesOf({ row, document }: ShownRevision): NightScene[] {
    try {
      return nightScenesOf(row, document);
    } catch (error) {
      this.logger.error(
        { err: error, revisionId: row.id },
        'the night of a proposal could not be worked out',
      );
      return [];
    }
  }

  private async rendered(
    { row }: ShownRevision,
    scene: NightScene,
    day: Buffer,
    taken: Taken,
  ): Promise<Buffer | null> {
    try {
      return await nightPicture(day, scene, taken);
    } catch (error) {
      const { sheetId } = scene;
      this.logger.error({ err: error, revisionId: row.id, sheetId }, 'a night picture could not be made');
      return null;
    }
  }
}

const offered = ({ document }: ShownRevision): Taken => new Set(document.price.combinations[0]?.groups);

const isSame = (a: Taken, b: Taken): boolean => a.size === b.size && [...a].every((id) => b.has(id));

const isLit = ({ groupId, output }: LightSource, taken: Taken): boolean =>
  output > 0 && (groupId === null || taken.has(groupId));

/** A picture of a sheet by day (JPEG, PNG or WebP) with the lights of these groups on, in the dark, as JPEG. */
export async function nightPicture(day: Buffer, scene: NightScene, taken: Taken): Promise<Buffer> {
  const { data, info } = await sharp(day)
    .resize({ width: LONGEST_PX, height: LONGEST_PX, fit: 'inside', withoutEnlargement: true })
    .toColourspace('srgb')
    .flatten({ background: 'white' })
    .ensureAlpha()
    .raw()
    .toBuffer({ resolveWithObject: true });
  const { width, height } = info;
  const photo = { width, height, data: new Uint8ClampedArray(data.buffer, data.byteOffset, data.length) };
  const on = (source: LightSource) => (isLit(source, taken) ? 1 : 0);
  const night = renderNight(photo, scene, { on, sunAltitude: FULL_NIGHT }, LONGEST_PX);
  const raw = { width: night.width, height: night.height, channels: 4 } as const;
  return sharp(night.data, { raw }).removeAlpha().jpeg({ quality: QUALITY, mozjpeg: true }).toBuffer();
}
