import type { Equilibrium } from '@/engine/equilibria/contract';
import type { PresetDocument } from '@/engine/schema/preset';

type Populations = PresetDocument['populations'];

function joinNames(names: readonly string[]): string {
  if (names.length < 2) return names[0] ?? '';
  return `${names.slice(0, -1).join(', ')} and ${names.at(-1) ?? ''}`;
}

function capitalised(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}

/** What an equilibrium is called: who is there. */
export function equilibriumName(populations: Populations, absent: readonly string[]): string {
  const present = populations.filter((one) => !absent.includes(one.symbol));
  if (present.length === 0) return 'Nobody there';
  if (absent.length === 0) return populations.length > 1 ? 'Coexistence' : 'Present';
  const names = joinNames(present.map((one) => one.name || one.symbol));
  return present.length === 1 ? `${capitalised(names)} alone` : `${capitalised(names)} only`;
}

export function equilibriumSentence(populations: Populations, equilibrium: Equilibrium): string {
  const feasible = equilibrium.feasible ? '' : ', not feasible';
  return `${equilibriumName(populations, equilibrium.absent)}: ${equilibrium.type}${feasible}`;
}
