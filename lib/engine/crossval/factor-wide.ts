import type { FoldSetup, WideFeatures } from '@/lib/engine/crossval/fold-setup';
import {
  dualFactor,
  SMALLEST_RELATIVE_PENALTY,
  spectralFactor,
  type SpectralFactor,
} from '@/lib/engine/estimators/spectral-factor';
import { standardise } from '@/lib/engine/features/standardise';
import type { Linalg } from '@/lib/engine/linalg/port';

/** A factor of many features with their scaling on the training trials. */
export interface WideFactor {
  factor: SpectralFactor;
  kept: Int32Array;
  mean: Float64Array;
  sd: Float64Array;
}

/**
 * The dual factor of features that come in blocks of columns: ZZᵀ and Z_test·Zᵀ are summed block by block, so that
 * memory is that of one block and of the nTrain × nTrain matrices. Blocks are summed in order, so that the bits do not
 * depend on anything else. Where the smallest penalty is too tiny for a Gram matrix all blocks are put together for an SVD.
 *
 * Cost nTrain·(nTrain + 2·nTest)·p + 9·nTrain³ flops.
 */
export function factorWide(
  setup: FoldSetup,
  wide: WideFeatures,
  smallestPenalty: number,
  linalg: Linalg,
): WideFactor {
  const { train, test, p } = setup;
  const nTrain = train.length;
  const nTest = test.length;
  const gram = new Float64Array(nTrain * nTrain);
  const cross = new Float64Array(nTest * nTrain);
  const kept: number[] = [];
  const mean: number[] = [];
  const sd: number[] = [];
  for (const block of wide.blocks) {
    const part = standardise(wide.features(block), block.to - block.from, train, test, setup.scaling);
    if (part.p === 0) continue;
    linalg.gram('rows', nTrain, part.p, part.zTrain, gram);
    linalg.gemm(
      'none',
      'transpose',
      nTest,
      nTrain,
      part.p,
      1,
      part.zTest,
      part.p,
      part.zTrain,
      part.p,
      1,
      cross,
      nTrain,
    );
    part.kept.forEach((j, at) => {
      kept.push(block.from + j);
      mean.push(part.mean[at]);
      sd.push(part.sd[at]);
    });
  }
  const scaling = { kept: Int32Array.from(kept), mean: Float64Array.from(mean), sd: Float64Array.from(sd) };
  const { values: w, vectors } = linalg.symmetricEigen(nTrain, gram);
  for (let j = 0; j < nTrain; j++) if (w[j] < 0) w[j] = 0;
  if (smallestPenalty >= SMALLEST_RELATIVE_PENALTY * w[nTrain - 1]) {
    return { factor: dualFactor(w, vectors, cross, nTrain, nTest, linalg), ...scaling };
  }
  const [first] = wide.blocks;
  const n = wide.features(first).length / (first.to - first.from);
  const x = new Float64Array(n * p);
  for (const block of wide.blocks) {
    const width = block.to - block.from;
    const part = wide.features(block);
    for (let i = 0; i < n; i++) x.set(part.subarray(i * width, (i + 1) * width), i * p + block.from);
  }
  const { zTrain, zTest, p: used } = standardise(x, p, train, test, setup.scaling);
  return { factor: spectralFactor(zTrain, nTrain, zTest, nTest, used, 0, linalg), ...scaling };
}
