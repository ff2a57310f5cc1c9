/** Whether WebGL runs without a graphics card here (then smoothing costs too much); null where there is no WebGL at all. */
export function rendersInSoftware(): boolean | null {
  const canvas = document.createElement('canvas');
  const gl = canvas.getContext('webgl2');
  if (!gl) return null;
  const about = gl.getExtension('WEBGL_debug_renderer_info');
  const name = String(gl.getParameter(about ? about.UNMASKED_RENDERER_WEBGL : gl.RENDERER));
  gl.getExtension('WEBGL_lose_context')?.loseContext();
  return /swiftshader|llvmpipe|softpipe|software|basic render/i.test(name);
}
