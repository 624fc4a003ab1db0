import { levelsOf, sourceLevelsOf } from '../chain/source-level.ts';
import { quantityOfLevel, quantityOfSensor } from '../rig/levels.ts';
import type { HeardSource, Level } from '../rig/model.ts';
import { type ChannelView, type Check, SAYS_NOTHING, type Said } from './check.ts';
import { standingOn } from './standing.ts';
import { listText } from './wording.ts';

export const levelUnplaced: Check<'channel'> = {
  name: 'level-unplaced',
  kind: 'channel',
  severity: 'warning',
  finds:
    "A level can't be turned into volts, or compared with full scale; or channels leave out a source because of that.",
  why: 'A level in the measured unit needs a sensitivity to become volts, and volts need a full scale to become dBFS. Without them the level is not used: full scale is assumed for its source, the peak is not checked, and what is said of them is less than could be said. At a source it is only a hint: it counts the channels that do not hear it because it is in a quantity that they do not measure.',
  shows: `rig: Fan bearing
digitizers:
  front-end: { full-scale: ±10 V }
sources:
  blade-pass: { frequency: 450 Hz, level: 2 g }
channels:
  bearing:
    measures: acceleration
    digitizer: front-end
    rate: 25.6 kHz
    band: 10 Hz .. 5 kHz
    hears: [blade-pass]
`,
  clean: `rig: Fan bearing
digitizers:
  front-end: { full-scale: ±10 V }
sources:
  blade-pass: { frequency: 450 Hz, level: 2 g }
channels:
  bearing:
    measures: acceleration
    sensitivity: 100 mV/g
    digitizer: front-end
    rate: 25.6 kHz
    band: 10 Hz .. 5 kHz
    hears: [blade-pass]
`,
  sources: ['Arithmetic: volts = level x sensitivity; dBFS = 20 log10(volts / full scale).'],
  run(view) {
    const { channel, chain } = view;
    const isOrdinary = chain.scale.unit === 'dbfs' && chain.scale.sensitivity !== undefined;
    // Nearly every channel: full scale and sensitivity are known, and no source is in another quantity.
    if (isOrdinary && channel.heard.every((heard) => isPlaced(heard, view))) return SAYS_NOTHING;
    return unplacedOn(view);
  },
};

/** Any voltage. */
const VOLTS: Level = { kind: 'volts', peakV: 1 };

function isPlaced(heard: HeardSource, { channel, chain }: ChannelView): boolean {
  const levels = levelsOf(heard);
  const first = levels[0];
  if (first?.kind !== 'measured') return true;
  const isSameUnit = channel.sensor?.unit !== undefined && levels.every(isIn(channel.sensor.unit));
  return isSameUnit || sourceLevelsOf(heard, channel.sensor, chain.scale).known;
}

function isIn(unit: string): (level: Level) => boolean {
  return (level) => level.kind === 'measured' && level.unit === unit;
}

function unplacedOn(view: ChannelView): readonly Said[] {
  const { channel, chain } = view;
  const { scale } = chain;
  const quantity = quantityOfSensor(channel.sensor);
  const withoutSensitivity: string[] = [];
  const withoutFullScale: string[] = [];
  const said: Said[] = [];
  /** Notes what keeps a level from being placed, if anything does. */
  const consider = (what: string, level: Level): 'elsewhere' | undefined => {
    if (level.kind === 'measured') {
      const own = quantityOfLevel(level);
      if (quantity !== undefined && own !== quantity) return 'elsewhere';
      if (scale.unit === 'db-measured') return undefined;
      if (scale.sensitivity === undefined) {
        withoutSensitivity.push(what);
        return undefined;
      }
    }
    if (scale.unit === 'relative' && level.kind !== 'dbfs') withoutFullScale.push(what);
    if ((scale.unit === 'db-volt' || scale.unit === 'db-measured') && level.kind === 'dbfs')
      withoutFullScale.push(what);
    if (scale.unit === 'db-measured' && level.kind === 'volts') withoutSensitivity.push(what);
    return undefined;
  };
  for (const heard of channel.heard) {
    const level = levelsOf(heard)[0];
    if (level && consider(`\`${heard.source.name}\``, level) === 'elsewhere')
      said.push(otherQuantity(heard, view, level));
  }
  const { undeclared, foldLimit, peak, resolve, sensor, sensorPlace, digitizer, digitizerPlace } = channel;
  const bound = undeclared?.value;
  if (bound?.kind === 'level') consider('`undeclared`', bound.level);
  if (bound?.kind === 'points' && bound.points[0]) consider('`undeclared`', bound.points[0].level);
  if (foldLimit && foldLimit.value.kind !== 'ratio' && scale.foldLimitAssumed)
    consider('`fold-limit`', foldLimit.value);
  if (peak) consider('`peak`', peak.value.high);
  if (resolve) consider('`resolve`', resolve.value);
  if (sensor?.noise) consider('the `noise` of the sensor', sensor.noise.value);
  if (digitizer?.noise) consider('the `noise` of the digitizer', VOLTS);
  // Of a name that stands for nothing that could be read, that has been said.
  if (withoutFullScale.length > 0 && (digitizer || !digitizerPlace)) said.push(noFullScale(withoutFullScale, view));
  if (withoutSensitivity.length > 0 && (sensor || !sensorPlace)) said.push(noSensitivity(withoutSensitivity, view));
  return said;
}

function otherQuantity(heard: HeardSource, { channel }: ChannelView, level: Level): Said {
  const unit = level.kind === 'measured' ? level.unit : '';
  const given = heard.level ?? heard.source.levels[0];
  const standing = standingOn(channel, heard.mention ? { place: heard.mention } : undefined);
  return {
    about: heard.source.name,
    message: `How high \`${heard.source.name}\` is recorded here can't be said: its level is in ${unit}, which this channel does not measure.`,
    place: standing.place,
    related: given
      ? [...standing.related, { place: given.place, message: 'The level stands here.' }]
      : standing.related,
    excess: 1,
  };
}

function noFullScale(what: readonly string[], { channel }: ChannelView): Said {
  const { digitizerPlace, digitizer } = channel;
  const standing = standingOn(channel, digitizerPlace ? { place: digitizerPlace } : undefined);
  const missing = digitizer ? `\`${digitizer.name}\` has no \`full-scale\`` : 'the channel names no digitizer';
  return {
    about: 'full-scale',
    message: `How high ${listText(what)} will stand against full scale can't be said, because ${missing}.`,
    place: standing.place,
    related: digitizer
      ? [...standing.related, { place: digitizer.place, message: 'The digitizer is described here.' }]
      : standing.related,
    excess: what.length,
  };
}

function noSensitivity(what: readonly string[], { channel }: ChannelView): Said {
  const { sensorPlace, sensor } = channel;
  const standing = standingOn(channel, sensorPlace ? { place: sensorPlace } : undefined);
  const missing = sensor ? 'the sensor has no `sensitivity`' : 'the channel has no sensor';
  return {
    about: 'sensitivity',
    message: `How many volts ${listText(what)} will make can't be said, because ${missing}.`,
    place: standing.place,
    related:
      sensor && sensor.name !== ''
        ? [...standing.related, { place: sensor.place, message: 'The sensor is described here.' }]
        : standing.related,
    excess: what.length,
  };
}
