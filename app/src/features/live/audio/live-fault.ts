/** Something about the rig that a person can mend: what is the matter, and what to do. */
export class LiveFault extends Error {
  readonly remedy: string;

  constructor(message: string, remedy: string, options?: ErrorOptions) {
    super(message, options);
    this.name = 'LiveFault';
    this.remedy = remedy;
  }
}

const REMEDIES: Readonly<Record<string, readonly [string, string]>> = {
  NotAllowedError: [
    'The browser may not listen to an input.',
    'Allow the microphone for this page at the address bar, then open the rig again.',
  ],
  NotFoundError: ['There is no input.', 'Plug the interface in, then open the rig again.'],
  OverconstrainedError: ['The input that was chosen is not there.', 'Plug it in, or choose another one.'],
  NotReadableError: [
    'The input can’t be opened.',
    'Another program may hold it for itself: close that, then open the rig again.',
  ],
  NotSupportedError: [
    'The browser can’t run at this rate.',
    'Set the interface to another rate, or choose another one here.',
  ],
};

/** A browser's refusal in our words. */
export function liveFaultOf(reason: unknown): LiveFault {
  if (reason instanceof LiveFault) return reason;
  const name = reason instanceof DOMException ? reason.name : '';
  const [what, remedy] = REMEDIES[name] ?? [
    `The rig did not open: ${reason instanceof Error ? reason.message : String(reason)}.`,
    'Open it again; if it stays so, record with another program and upload the file.',
  ];
  return new LiveFault(what, remedy, { cause: reason });
}
