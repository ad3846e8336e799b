import type { CompiledSystem } from '../system/contract';
import { INTEGRATION_DEFAULTS, type IntegrationOptions, type MethodName } from './contract';
import { ExplicitRungeKutta } from './explicit-runge-kutta';
import type { MethodSetting, OneStepMethod } from './one-step-method';
import { RosenbrockRodas } from './rosenbrock-rodas';
import { Stepper } from './stepper';
import { DORMAND_PRINCE_54 } from './tableaus/dormand-prince-54';
import { DORMAND_PRINCE_853 } from './tableaus/dormand-prince-853';

/** Below this the pair of high order needs fewer evaluations than the one of order 5. */
const HIGH_ORDER_BELOW = 1e-6;

/** Tolerances with the defaults filled in. */
export function methodSetting(system: CompiledSystem, options: IntegrationOptions = {}): MethodSetting {
  return {
    system,
    relativeTolerance: options.relativeTolerance ?? INTEGRATION_DEFAULTS.relativeTolerance,
    absoluteTolerance: options.absoluteTolerance ?? INTEGRATION_DEFAULTS.absoluteTolerance,
  };
}

/** The one-step method of a name; `auto` begins with an explicit pair. odex is none, see `odex-extrapolation`. */
export function createMethod(name: Exclude<MethodName, 'odex'>, setting: MethodSetting): OneStepMethod {
  switch (name) {
    case 'dormand-prince-54':
      return new ExplicitRungeKutta(setting, DORMAND_PRINCE_54);
    case 'dormand-prince-853':
      return new ExplicitRungeKutta(setting, DORMAND_PRINCE_853);
    case 'rodas':
      return new RosenbrockRodas(setting);
    case 'auto':
      return createMethod(
        setting.relativeTolerance < HIGH_ORDER_BELOW ? 'dormand-prince-853' : 'dormand-prince-54',
        setting,
      );
  }
}

/** A stepper ready to `begin`; odex is replaced by `auto`, since it has no steps of this kind. */
export function createStepper(system: CompiledSystem, options: IntegrationOptions = {}): Stepper {
  const setting = methodSetting(system, options);
  const name = options.method ?? 'auto';
  return new Stepper(createMethod(name === 'odex' ? 'auto' : name, setting), setting);
}

/**
 * Takes over from a stepper whose system proved stiff: the same place, the stiff method. Returns the
 * stepper itself where the choice of method was not left to us or it is not stiff.
 */
export function takeOverIfStiff(
  stepper: Stepper,
  system: CompiledSystem,
  end: number,
  options: IntegrationOptions = {},
): Stepper {
  if (!stepper.stiff || (options.method ?? 'auto') !== 'auto') return stepper;
  return stiffStepperFrom(
    system,
    {
      time: stepper.time,
      state: stepper.state,
      step: stepper.time - stepper.previousTime,
      steps: stepper.steps,
      rejected: stepper.rejected,
      evaluations: stepper.method.evaluations,
    },
    end,
    options,
  );
}

/** Where a run stands when another method takes over. */
export interface RunSoFar {
  readonly time: number;
  readonly state: Float64Array;
  /** Length of the last step. */
  readonly step: number;
  readonly steps: number;
  readonly rejected: number;
  readonly evaluations: number;
}

/** The stiff method from where another one stands. */
export function stiffStepperFrom(
  system: CompiledSystem,
  so: RunSoFar,
  end: number,
  options: IntegrationOptions = {},
): Stepper {
  const setting = methodSetting(system, options);
  const method = createMethod('rodas', setting);
  method.evaluations = so.evaluations;
  const successor = new Stepper(method, setting);
  successor.begin(so.time, so.state, end - so.time, so.step);
  successor.steps = so.steps;
  successor.rejected = so.rejected;
  return successor;
}
