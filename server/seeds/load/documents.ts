import { STARTER_PRESETS } from '@/presets';
import type { PresetDocument } from '@/engine/schema/preset';

import { pick, type Draw } from './random';

const ANIMALS =
  'newts,springtails,voles,lynx,grasshoppers,kestrels,snails,smelt,sturgeon,lemmings,barnacles,minnows,beetles,moths,terns'.split(
    ',',
  );
const PLACES =
  'fen,heath,moor,estuary,tarn,dune slack,beck,salt marsh,oxbow,copse,quarry pond,limestone pavement'.split(
    ',',
  );
const WORDS =
  'mortality,harvest,spread,winter,mating,stage,morph,density,refuge,migration,disease,drought,grazing,shelter,ice'.split(
    ',',
  );
const TAGS =
  'two sexes,stages,two morphs,harvest,competition,food chain,season,mating,field data,draft,for the seminar,checked,pilot,long run,review'.split(
    ',',
  );

/** A small document of its own: a starter with another name, summary, tags and numbers. */
export function drawDocument(draw: Draw): PresetDocument {
  const { document } = pick(draw, STARTER_PRESETS);
  const words = Array.from({ length: 8 }, () => pick(draw, WORDS));
  return {
    ...document,
    title: `${pick(draw, ANIMALS)} of the ${pick(draw, PLACES)}: ${document.title}`.slice(0, 120),
    summary: `How ${words.slice(0, 4).join(', ')} act on it, and whether ${words.slice(4).join(' or ')} decides.`,
    tags: [...new Set([pick(draw, TAGS), pick(draw, TAGS), ...document.tags.slice(0, 1)])],
  };
}

/** The same with another number, as the next version has it. */
export function drawNextVersion(draw: Draw, document: PresetDocument): PresetDocument {
  const turned = Math.floor(draw() * document.parameters.length);
  return {
    ...document,
    parameters: document.parameters.map((one, k) =>
      k === turned ? { ...one, value: one.min + draw() * (one.max - one.min) } : one,
    ),
  };
}
