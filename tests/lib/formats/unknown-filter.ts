import h5wasm, { ready } from 'h5wasm';

/** An HDF5 file whose dataset "completeness" went through a filter that nobody registered. */
export async function withUnknownFilter(): Promise<Uint8Array> {
  const { FS } = await ready;
  const file = new h5wasm.File('/made.h5', 'w', { libver: ['earliest', 'v108'] });
  file.create_dataset({
    name: 'completeness',
    data: new Float32Array(16).fill(0.5),
    shape: [4, 4],
    chunks: [4, 4],
    compression: 'gzip',
  });
  file.close();
  const bytes = Buffer.from(FS.readFile('/made.h5'));
  const name = bytes.indexOf('deflate\0', 0, 'latin1');
  if (name < 8) throw new Error('the made file names no filter');
  bytes.writeUInt16LE(32_999, name - 8);
  return new Uint8Array(bytes);
}
