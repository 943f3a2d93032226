export const HELP = `Benchlark's command line

  analyse FILE.wav     measure a recording
      --measure NAME         tone, idle, dynamic-range; without it the program says what it took the file for
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
                       write a test signal (sine, low-level-tone, silence) and its descriptor
      --bits 16|24|32f  --level DBFS  --ceiling DBFS  --frequency HZ  --duration S
      --channels both|left|right  --dither tpdf|none  --seed N  --bare
  practice IN.wav OUT.wav --device FILE.json|NAME
                       pass a recording through a practice device
  upload FILE.wav... --to URL --token T
                       archive recordings on a server (make a token on your account page)

Exit codes: 0 done, 2 wrong usage, 3 the file can't be read or isn't supported, 4 nothing measurable, 5 does not agree.
`;
