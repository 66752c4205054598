/** Raw bytes that one worker takes at a time. */
export const PARTITION_BYTES = 2_500_000;

/**
 * Cuts the substances, in their order, into runs of about `target` raw bytes each. The cut depends on the input alone,
 * never on the machine, since the parts of the large tables follow it. A library below one and a half targets is one run.
 *
 * @returns for each run, the index of its first substance and of the one after its last
 */
export function partition(
  bytesOf: ArrayLike<number>,
  target = PARTITION_BYTES,
): { readonly from: number; readonly to: number }[] {
  let total = 0;
  for (let i = 0; i < bytesOf.length; i++) total += bytesOf[i]!;
  const wanted = Math.max(1, Math.round(total / target));
  const share = total / wanted;
  const runs: { from: number; to: number }[] = [];
  let from = 0;
  let passed = 0;
  for (let i = 0; i < bytesOf.length; i++) {
    passed += bytesOf[i]!;
    if (runs.length < wanted - 1 && passed >= share * (runs.length + 1)) {
      runs.push({ from, to: i + 1 });
      from = i + 1;
    }
  }
  if (from < bytesOf.length || runs.length === 0) runs.push({ from, to: bytesOf.length });
  return runs;
}
