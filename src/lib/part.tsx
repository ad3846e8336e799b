import { createElement, useEffect, useState, type ComponentType, type ReactNode } from 'react';

interface PartModule<Props> {
  readonly default: ComponentType<Props>;
}

/**
 * A component in a chunk of its own, shown as soon as it is there. `lazy` would hold it back for a third of a
 * second whenever a fallback was shown before it.
 *
 * @param load imports the chunk; called when the part is first shown, or by `begin`
 */
export function part<Props extends object>(load: () => Promise<PartModule<Props>>) {
  let loaded: ComponentType<Props> | null = null;
  let loading: Promise<void> | null = null;
  const begin = (): Promise<void> => {
    loading ??= load().then(
      (module) => {
        loaded = module.default;
      },
      (reason: unknown) => {
        // Another look may find the connection back.
        loading = null;
        throw reason;
      },
    );
    return loading;
  };
  function Part({ fallback, ...props }: Props & { readonly fallback: ReactNode }) {
    const [failure, setFailure] = useState<{ readonly reason: unknown } | null>(null);
    const [, setReady] = useState(loaded !== null);
    useEffect(() => {
      let live = true;
      begin().then(
        () => live && setReady(true),
        (reason: unknown) => live && setFailure({ reason }),
      );
      return () => {
        live = false;
      };
    }, []);
    if (failure) throw failure.reason;
    return loaded ? createElement(loaded, props as unknown as Props) : fallback;
  }
  return Object.assign(Part, { begin });
}
