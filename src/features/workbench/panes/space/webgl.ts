export type WebglKind = 'none' | 'software' | 'hardware';

let kind: WebglKind | null = null;

/** Whether there is WebGL, and whether a graphics card draws it or the processor must. */
export function webglKind(): WebglKind {
  if (kind !== null) return kind;
  const context = document.createElement('canvas').getContext('webgl2');
  if (!context) return (kind = 'none');
  const details = context.getExtension('WEBGL_debug_renderer_info');
  const renderer = String(context.getParameter(details?.UNMASKED_RENDERER_WEBGL ?? context.RENDERER));
  context.getExtension('WEBGL_lose_context')?.loseContext();
  return (kind = /swiftshader|llvmpipe|software/i.test(renderer) ? 'software' : 'hardware');
}

export function hasWebgl(): boolean {
  return webglKind() !== 'none';
}
