/** The closed list of warnings, each with a sentence for people. `{…}` is filled in by the measure. */
export const WARNING_SENTENCES = {
  'file-size-lies':
    'The file says it holds {declared} but holds {present}: the recorder was probably cut off. The whole frames present were measured.',
  // the file
  'size-not-set':
    'The header gives no length for the samples (it says {declared}), as a recorder writes that streams or was cut off: all that follows was measured, {present}.',
  'last-frame-cut':
    'The samples end with {bytes} of an incomplete frame at byte {offset}: they were left out.',
  'riff-size-wrong':
    'The header says the file holds {declared}, and it holds {present}: the statement was ignored.',
  'size-table-missing':
    'The file is {container} and has no readable ds64 chunk with its 64-bit sizes: sizes were taken from the chunks.',
  'pad-byte-missing':
    'The pad byte after the odd-sized chunk {chunk} at byte {offset} is missing: the next chunk was found without it.',
  'chunk-cut-short':
    'The chunk {chunk} at byte {offset} says it holds {declared}, and {present} are left: it was not read.',
  'chunk-malformed':
    'The chunk {chunk} at byte {offset} holds {present}, and {expected} are needed: it was not read.',
  'trailing-bytes': 'From byte {offset} on, {present} belong to no chunk: they were not read.',
  'too-many-chunks': 'The file has more than {count} chunks: those from byte {offset} on were not read.',
  'second-data-chunk':
    'The file has another data chunk at byte {offset}: the one at byte {measured} was measured.',
  'byte-rate-wrong':
    'The fmt chunk gives {found} bytes a second at byte {offset}, where rate and block size make it {expected}: ignored.',
  'frame-count-differs':
    'The {chunk} chunk counts {declared} frames, and the samples make {present}: the samples count.',
  'valid-bits-exceeded':
    'The samples use more than the {bits} bits the header calls valid: they were read as they stand, against the full scale of {containerBits} bits.',
  'over-full-scale':
    'The channel {channel} has {count} samples beyond full scale, up to {peak} times full scale: they were kept as they are.',
  // the recording
  'too-short':
    'The segment of {duration} s is too short for a tone of {frequency} Hz: lines closer than {resolution} Hz run together. Record at least {wanted} s.',
  'channel-silent': 'The channel {channel} holds digital silence: it has no figures.',
  'tone-missing': 'The channel {channel} holds no steady tone: it has no figures.',
  'tone-not-steady':
    'The tone is not steady ({change}): figures near the tone are only a guide. Check for pumping, dropouts or a varying speed.',
  'level-too-low':
    'The tone lies at {level} dBFS, so its figures show the noise: raise the level or the recorder’s gain.',
  'level-assumed': 'Nothing says at which level the tone was played: it was taken as the unit’s -60 dBFS.',
  'level-unexpected':
    'The tone lies at {level} dBFS, far above the -60 dBFS it is taken for: if it was played louder, the dynamic range is wrong by as much.',
  'recording-overloaded':
    'The recording is clipped: {runs} runs of three or more samples stand at an end of the scale. Lower the recorder’s gain and record again.',
  'near-full-scale':
    'The recording peaks at {peak} dBFS: leave the recorder some headroom, or its own distortion may show.',
  'dc-offset':
    'The recording stands off zero by {offset} % of full scale ({level} dBFS). The figures leave it out.',
  'signal-present':
    'The channel {channel} isn’t idle: a line at {frequency} Hz stands at {level} dBFS and is counted as noise.',
  // the frequency band
  'band-widened':
    'The tone of {frequency} Hz lies at the end of the usual band: the band reaches to {high} Hz.',
  'band-cut': 'At a rate of {rate} Hz the band can’t reach {asked} Hz: it ends at {high} Hz.',
  'band-near-limit':
    'The band reaches {high} Hz, more than 0.46 of the rate of {rate} Hz: the converters’ filters take part of it.',
  'tone-outside-band': 'The tone of {frequency} Hz lies outside the band: it was measured all the same.',
  'no-harmonics-in-band':
    'No harmonic of {frequency} Hz lies inside the band: there is no THD. Widen the band or use a lower tone.',
  // what stands in the way
  'harmonics-in-noise': 'No harmonic stands out of the noise: THD is below {below} dB.',
  'hum-in-residual':
    'Mains hum makes up more than half of what is left beside the tone ({level} dBFS at multiples of {frequency} Hz): look to the ground connections first.',
  'hum-on-harmonic':
    'The tone’s line or a harmonic falls on a multiple of {frequency} Hz mains: hum and distortion can’t be told apart there. Use another frequency.',
  'products-in-noise':
    'The products of the two tones in the channel {channel} stand in its noise: their figures are only bounds.',
  'step-products-in-noise':
    'At some levels the products in the channel {channel} stand in its noise, {below} dB down at the loudest step: they are left out there.',
  'no-hum': 'No line of 50 or 60 Hz mains or its multiples stands out of the noise.',
  'hum-unresolved':
    'The segment of {duration} s is too short to tell mains hum from noise: record at least {wanted} s.',
  'digital-silence':
    'Every sample of the channel {channel} is zero: the player or recorder muted, and noise can’t be stated.',
  'nothing-left':
    'Beside the tone every sample of the channel {channel} is accounted for: noise can’t be stated.',
  // what a figure is worth
  'quantisation-limited': 'The {bits} bits of the recording set these figures, not the unit.',
  'rig-limited': 'These figures lie within 3 dB of the rig’s own: they show the rig, not the unit.',
  'rig-influenced': 'The rig has a part in these figures: the bounds beside each say how much.',
  'baseline-not-applicable': 'The rig’s baseline was not applied: {reason}.',
  'calibration-not-applicable':
    'The channel {channel} has no figures in volts: the calibration holds at {calibrated} Hz, and this recording is one of {rate} Hz.',
  'calibration-incomplete':
    'The calibration says nothing of the channel {channel}: it has no figures in volts.',
  'stimulus-mismatch':
    'The descriptor says {declared}, and the recording holds {found}: it was measured as it is.',
  'recording-cut': 'The recording {where}: what is there was measured.',
  'segment-missing': 'The programme’s part {name} is not in the recording: it has no figures.',
  'segment-cut':
    'The recording holds the programme’s part {name} only from {from} to {to} s: what is there was measured.',
  'segment-not-measured': 'The programme’s part {name} could not be measured: {reason}.',
  'separation-in-noise':
    'What leaks from {direction} at {frequency} Hz stands in the noise: the separation is at least {least} dB.',
  'channels-swapped':
    'Each channel’s sweep lies in the other channel: left and right are swapped somewhere between player and recorder.',
  'no-sidebands':
    'No pair of lines stands out beside the tone in the channel {channel}: jitter is below the bound given.',
  'tones-unresolved': 'The segment is too short to part the lowest tones: record at least {wanted} s.',
  'too-short-for-loudness': 'Loudness wants 0.4 s at least, and its range 3 s: the recording is shorter.',
  'too-quiet-for-loudness': 'Nothing in the recording reaches -70 LUFS: it has no loudness to state.',
  'programme-clipped':
    'The programme is cut off: {runs} runs of three or more samples stand at an end of the scale.',
  'sweep-cut': 'The recording lacks the sweep {missing}: the response is not to be trusted there.',
  'clock-unknown':
    'Without marks nothing tells the clocks of player and recorder apart: the phase is left out.',
  'no-half-power-point':
    'The response of the channel {channel} does not fall by 3 dB within the sweep: there is no such frequency to state.',
  'steps-missing':
    'The recording lacks the steps at {levels} dBFS: it began after them or ended before. The others were measured.',
  'steps-in-noise':
    'Below {level} dBFS the steps of the channel {channel} are lost in its noise: they are left out.',
  'no-reference-step': 'The steps hold none near -20 dBFS: deviation is against the step at {level} dBFS.',
  'timeline-broken':
    'Samples were lost or doubled in the recording {where}: the parts were found one by one, and what falls on the break is not to be trusted.',
  'noise-missing': 'The channel {channel} holds no white noise: it has no figures.',
  'ripple-in-noise':
    'The ripple is no greater than the noise’s own unevenness of {floor} dB: record for longer to see smaller ones.',
  'images-out-of-reach':
    'A recording at {rate} Hz doesn’t show images about half of {player}: record at twice the player’s rate and give the descriptor.',
  'stimulus-assumed':
    'The recording has neither marks nor a descriptor: it was measured as a {name}, with levels relative to the loudest part.',
} as const;

export type WarningCode = keyof typeof WARNING_SENTENCES;
