import h5wasm from 'h5wasm/node';

/** 600 MB of float64 samples in chunks, written block by block. */
export async function writeLarge(path: string): Promise<void> {
  await h5wasm.ready;
  const rate = 16384;
  const block = 1 << 20;
  const blocks = 72;
  const file = new h5wasm.File(path, 'w');
  const x = new Float64Array(block);
  let s = 1;
  const fill = (): Float64Array => {
    for (let i = 0; i < block; i++) {
      s = (Math.imul(s, 1664525) + 1013904223) >>> 0;
      x[i] = (s / 2 ** 32 - 0.5) * 1e-21;
    }
    return x;
  };
  const data = file.create_dataset({
    name: 'strain',
    data: fill(),
    maxshape: [block * blocks],
    chunks: [65536],
    dtype: '<d',
  });
  data.create_attribute('sample rate (Hz)', rate);
  data.create_attribute('unit', 'strain');
  data.resize([block * blocks]);
  for (let k = 1; k < blocks; k++) data.write_slice([[k * block, (k + 1) * block]], fill());
  file.close();
}
