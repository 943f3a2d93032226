import { measures, STIMULUS_NAMES } from '@benchlark/dsp';

const WIDTH = 110;

/** Names in lines that stand under each other. */
function listNames(names: readonly string[], indent: number): string {
  const lines = [''];
  for (const name of names) {
    const joined = lines[lines.length - 1] === '' ? name : `${lines[lines.length - 1]}, ${name}`;
    if (indent + joined.length < WIDTH) lines[lines.length - 1] = joined;
    else {
      lines[lines.length - 1] += ',';
      lines.push(name);
    }
  }
  return lines.join(`\n${' '.repeat(indent)}`);
}

export const HELP = `Benchlark's command line

  analyse FILE.wav     measure a recording
      --measure NAME         without it the program says what it took the file for
                             ${listNames(
                               measures.map(({ id }) => id),
                               29,
                             )}
      --stimulus FILE.json   the descriptor of the stimulus that was played
      --band LOW:HIGH        Hz (20:20000)
      --from S  --to S       the part to measure, seconds
      --channel C            left, right or all
      --calibration FILE.json  volts at digital full scale
      --baseline RECORD.json   the record of the rig without a unit
      --traces T             none, reduced (2,000 points, peaks kept) or full
      --json                 the record alone on standard output
  inspect FILE.wav...  say what each file is, reading every sample  [--json: one line a file]
  verify RECORD.json FILE.wav
                       compute a record again and name the figures that differ
  stimulus NAME --rate HZ --out FILE.wav
                       write a test signal and its descriptor:
                       ${listNames(STIMULUS_NAMES, 23)}
      --bits 16|24|32f  --level DBFS  --ceiling DBFS  --frequency HZ  --low HZ --high HZ (pairs)  --duration S
      --channels both|left|right  --dither tpdf|none  --seed N  --bare  --quick (the programme in 30 s)
  power STEPS.json --calibration FILE.json --load OHM
                       watts at 0.1 and 1 % THD+N from level steps  [--input-volts V at 0 dBFS: gain; --json]
  impedance UNLOADED.json LOADED.json --load OHM
                       output impedance and damping factor from two takes of a tone
                       [--uncertainty DB of one level against the other, 0.001; --json]
  phono SWEEP.json     deviation from the replay curve of records
                       [--amendment; --recorded: the sweep had the recording curve; --json]
  practice IN.wav OUT.wav --device FILE.json|NAME
                       pass a recording through a practice device
  upload FILE.wav... --to URL --token T
                       archive recordings on a server (make a token on your account page)

Exit codes: 0 done, 2 wrong usage, 3 the file can't be read or isn't supported, 4 nothing measurable, 5 does not agree.
`;
