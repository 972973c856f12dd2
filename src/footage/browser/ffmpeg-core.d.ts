/** The ffmpeg core comes without types; what of it is used is described with our own. */
declare module "@ffmpeg/core" {
  const createCore: import("../wasm/core.ts").CoreFactory;
  export default createCore;
}
