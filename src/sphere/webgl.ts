export type WebGlSupport = 'none' | 'software' | 'hardware';

const SOFTWARE_RENDERER = /SwiftShader|llvmpipe|softpipe|Basic Render/i;

/**
 * Whether this browser can draw in 3D, found out before anything of it is loaded: mounting a canvas without WebGL throws.
 * `failIfMajorPerformanceCaveat` doesn't tell software drawing apart, so the renderer's name is read.
 */
export function probeWebGl(): WebGlSupport {
  try {
    const canvas = document.createElement('canvas');
    const gl = canvas.getContext('webgl2');
    if (gl === null) return 'none';
    const info = gl.getExtension('WEBGL_debug_renderer_info');
    const renderer: unknown = gl.getParameter(info === null ? gl.RENDERER : info.UNMASKED_RENDERER_WEBGL);
    // A browser keeps only a few contexts: give this one back at once.
    gl.getExtension('WEBGL_lose_context')?.loseContext();
    return typeof renderer === 'string' && SOFTWARE_RENDERER.test(renderer) ? 'software' : 'hardware';
  } catch {
    return 'none';
  }
}
