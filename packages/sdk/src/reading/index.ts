export { READING_RUN_OPTIONS, makeReading, type ReadingOptions } from './makeReading.js';
export {
  DEFAULT_READING_RULES,
  judgeReading,
  type JudgeReading,
  type ReadingFacts,
  type ReadingRules,
  type Verdict,
} from './readingRules.js';
export { type Message, type MessageKey, type Messages, messagesFor } from './messages/catalogue.js';
export { makeStation, type StationInput } from './makeStation.js';
export { makeExcerpt, type ExcerptOptions } from './makeExcerpt.js';
export { updateStation, type UpdateOptions } from './updateStation.js';
export { type ReadTextOptions, readExcerpt, readReading, readStation, writeExcerpt, writeReading, writeStation } from './stationText.js';
export { SDK_VERSION } from './version.js';
