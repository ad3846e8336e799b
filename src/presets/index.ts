/** Starter presets, one a file: scenarios of our own with invented rates, each with facts that a test checks. */
import type { PresetDocument } from '@/engine/schema/preset';

import { alleeUnderHarvest } from './allee-under-harvest';
import { harvestAndClosure } from './harvest-and-closure';
import { juvenileAdultConsumer } from './juvenile-adult-consumer';
import { neutralPredatorPrey } from './neutral-predator-prey';
import { saturatingTwoSexPredator } from './saturating-two-sex-predator';
import { scarceMates } from './scarce-mates';
import { seasonalGrowth } from './seasonal-growth';
import { selfRegulatedPrey } from './self-regulated-prey';
import { threeCompetitors } from './three-competitors';
import { threeLevelFoodChain } from './three-level-food-chain';
import { twoCompetitors } from './two-competitors';
import { twoMorphPrey } from './two-morph-prey';
import { twoSexPredator } from './two-sex-predator';

export interface StarterPreset {
  /** Stable across versions of the product. */
  readonly id: string;
  readonly document: PresetDocument;
}

export const STARTER_PRESETS: readonly StarterPreset[] = [
  { id: 'neutral-predator-prey', document: neutralPredatorPrey },
  { id: 'self-regulated-prey', document: selfRegulatedPrey },
  { id: 'two-sex-predator', document: twoSexPredator },
  { id: 'two-morph-prey', document: twoMorphPrey },
  { id: 'saturating-two-sex-predator', document: saturatingTwoSexPredator },
  { id: 'juvenile-adult-consumer', document: juvenileAdultConsumer },
  { id: 'scarce-mates', document: scarceMates },
  { id: 'harvest-and-closure', document: harvestAndClosure },
  { id: 'allee-under-harvest', document: alleeUnderHarvest },
  { id: 'seasonal-growth', document: seasonalGrowth },
  { id: 'two-competitors', document: twoCompetitors },
  { id: 'three-competitors', document: threeCompetitors },
  { id: 'three-level-food-chain', document: threeLevelFoodChain },
];
