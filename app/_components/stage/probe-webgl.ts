export interface WebglAbility {
  able: boolean;
  /** the processor draws, not a graphics card: fewer and plainer frames while the eye moves */
  software: boolean;
}

let known: WebglAbility | undefined;

/** Asked once a page: whether the browser gives a WebGL 2 context, and what draws it. */
export function probeWebgl(): WebglAbility {
  known ??= ask();
  return known;
}

function ask(): WebglAbility {
  try {
    const gl = document.createElement('canvas').getContext('webgl2');
    if (!gl) return { able: false, software: false };
    const info = gl.getExtension('WEBGL_debug_renderer_info');
    const renderer = String(gl.getParameter(info ? info.UNMASKED_RENDERER_WEBGL : gl.RENDERER));
    gl.getExtension('WEBGL_lose_context')?.loseContext();
    return { able: true, software: /swiftshader|llvmpipe|software|basic render/i.test(renderer) };
  } catch {
    return { able: false, software: false };
  }
}
