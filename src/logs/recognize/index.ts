export { type AutoLayout, autoLayout } from './autoLayout.js';
export { layoutYaml } from './layoutYaml.js';
export type {
  Doubt,
  PreviewRow,
  Recognition,
  RecognizedLog,
  RecognizeOptions,
  UnrecognizedLog,
} from './recognition.js';
export { recognitionText } from './recognitionText.js';
export { recognizeLayout } from './recognizeLayout.js';
