import { Entity, Index, Property } from '@mikro-orm/core';
import { IntegerColumn, References, TextColumn } from '../database/columns.js';
import { Vessel } from '../vessels/vessel.entity.js';
import { LogChannel } from './log-channel.entity.js';

/** The counted cycles and the residue of one channel, in the engine's own compact form. */
@Entity({ tableName: 'load_spectrum' })
export class StoredSpectrum {
  @References(() => LogChannel, { primary: true })
  logChannel!: string;

  @Index({ name: 'load_spectrum_vessel' })
  @References(() => Vessel)
  vessel!: string;

  /** First byte of `data`: the version of the form. */
  @IntegerColumn()
  format!: number;

  @Property({ type: 'blob', columnType: 'bytea' })
  data!: Buffer;

  @TextColumn()
  sha256!: string;
}
