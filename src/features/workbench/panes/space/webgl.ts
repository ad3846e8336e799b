import { WebGLRenderer, type WebGLRendererParameters } from 'three';

export type WebglKind = 'none' | 'software' | 'hardware';

let kind: WebglKind | null = null;

/** Whether there is WebGL, and whether a graphics card draws it or the processor must; null until first tried. */
export function webglKind(): WebglKind | null {
  return kind;
}

/**
 * The scene's renderer, or null where the browser offers no WebGL. The first one tells what kind there is: a
 * context of its own for that question would cost as much as the scene's.
 */
export function createRenderer(parameters: WebGLRendererParameters): WebGLRenderer | null {
  try {
    const renderer = new WebGLRenderer(parameters);
    kind ??= readKind(renderer.getContext());
    // Asking after each shader makes the page wait until the driver has built it.
    renderer.debug.checkShaderErrors = import.meta.env.DEV;
    return renderer;
  } catch {
    kind = 'none';
    return null;
  }
}

function readKind(context: WebGLRenderingContext | WebGL2RenderingContext): WebglKind {
  const details = context.getExtension('WEBGL_debug_renderer_info');
  const renderer = String(context.getParameter(details?.UNMASKED_RENDERER_WEBGL ?? context.RENDERER));
  return /swiftshader|llvmpipe|software/i.test(renderer) ? 'software' : 'hardware';
}
