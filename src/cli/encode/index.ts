export type { Rotation } from "./coded-picture.ts";
export {
  type Codec,
  type Container,
  containersOf,
  type EncodeOptions,
  encodeRecording,
  type Pictures,
} from "./encode.ts";
