export interface LabelWish {
  /** Where the label would like its middle, px. */
  readonly wanted: number;
  /** Its height with the air around it, px: 17, or 31 with a second line. */
  readonly height: number;
}

/**
 * Middles of labels that overlap no more: neighbours push each other apart equally, then all are held within the
 * frame. Returned in the order given. Where they can't all fit they share the frame evenly.
 */
export function spreadLabels(wishes: readonly LabelWish[], top: number, bottom: number): number[] {
  const order = wishes.map((_, index) => index).sort((a, b) => wanted(a) - wanted(b) || a - b);
  function wanted(index: number): number {
    return wishes[index]?.wanted ?? 0;
  }
  function half(index: number): number {
    return (wishes[index]?.height ?? 0) / 2;
  }

  // Groups of touching labels, each at the mean of its members' wishes: the least moved arrangement.
  interface Group {
    members: number[];
    start: number;
    height: number;
  }
  const place = (members: number[]): Group => {
    let offset = 0;
    let sum = 0;
    for (const member of members) {
      sum += wanted(member) - offset - half(member);
      offset += 2 * half(member);
    }
    const start = Math.max(top, Math.min(bottom - offset, sum / members.length));
    return { members, start, height: offset };
  };
  const groups: Group[] = [];
  for (const index of order) {
    let group = place([index]);
    for (
      let before = groups.at(-1);
      before && before.start + before.height > group.start;
      before = groups.at(-1)
    ) {
      groups.pop();
      group = place([...before.members, ...group.members]);
    }
    groups.push(group);
  }

  const middles = new Array<number>(wishes.length).fill(0);
  for (const { members, start } of groups) {
    let offset = start;
    for (const member of members) {
      middles[member] = offset + half(member);
      offset += 2 * half(member);
    }
  }
  return middles;
}
