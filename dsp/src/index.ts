export * from './errors.js';
export * from './source/sample-source.js';
export * from './record/record.js';
export * from './record/warning.js';
export * from './measures/measure.js';
export * from './stimulus/descriptor.js';
export * from './random/create-random.js';
export * from './record/make-warning.js';
export * from './source/channel-name.js';
export * from './source/find-non-finite.js';
export * from './source/open-memory-source.js';
export * from './source/slice-source.js';
export * from './source/select-channels.js';
export * from './record/compare-records.js';
export * from './record/dsp-version.js';
export * from './record/embed-baseline.js';
export * from './record/figure-unit.js';
export * from './record/parse-calibration.js';
export * from './record/parse-record.js';
export * from './record/reduce-trace.js';
export * from './record/round-numbers.js';
export * from './record/to-record-json.js';
export * from './wav/broadcast-extension.js';
export * from './wav/create-wav-encoder.js';
export * from './wav/encode-samples.js';
export * from './wav/inspect-wav.js';
export * from './wav/open-wav.js';
export * from './wav/random-access-bytes.js';
export * from './wav/wav-file.js';
export type { BroadcastExtensionInput } from './wav/write-broadcast-extension.js';
export * from './level/decibel.js';
export * from './level/quantisation.js';
export * from './level/create-level-meter.js';
export * from './level/create-true-peak-meter.js';
export * from './window/window-coefficients.js';
export * from './window/create-window.js';
export * from './window/window-response.js';
export * from './weighting/weighting-curves.js';
export * from './spectrum/create-real-fft.js';
export * from './spectrum/power-spectrum.js';
export * from './spectrum/create-spectrum-averager.js';
export * from './spectrum/integrate-band.js';
export * from './spectrum/remove-lobes.js';
export * from './tone/estimate-tone.js';
export * from './tone/fit-sine.js';
export * from './tone/phasor.js';
export * from './findings/propose-findings.js';
export * from './measures/registry.js';
export * from './measures/recognise.js';
export * from './measures/analyse-capture.js';
export * from './stimulus/create-stimulus.js';
export * from './stimulus/parse-descriptor.js';
export * from './stimulus/mark-codes.js';
export {
  STIMULUS_KINDS,
  STIMULUS_NAMES,
  type StimulusDefaults,
  type StimulusKind,
} from './stimulus/stimulus-kinds.js';
export * from './stimulus/standard-descriptor.js';
export { LEAD_IN_LEVEL_DBFS } from './stimulus/stimulus-layout.js';
export {
  HIGHEST_STIMULUS_RATE_HZ,
  LOWEST_STIMULUS_RATE_HZ,
  type StimulusOptions,
} from './stimulus/stimulus-options.js';
export * from './practice/device.js';
export * from './practice/parse-device.js';
export * from './practice/apply-device.js';
export * from './practice/create-practice-stream.js';
export * from './practice/practice-devices.js';
export * from './stimulus/locate-marks.js';
export * from './live/break-detector.js';
export * from './live/input-grid.js';
export * from './live/live-analyser.js';
export * from './live/self-check.js';
export { HIGHEST_RATE_HZ, LOWEST_RATE_HZ, MOST_CHANNELS } from './wav/read-format.js';
export * from './amplifier/riaa-curve.js';
export * from './amplifier/riaa-deviation.js';
export * from './amplifier/output-impedance.js';
export * from './amplifier/output-power.js';
