import { type Packed, unpredicted, unshuffled, unshuffledSingle, valuesOf } from '../packed.ts';

/** Arrays out of the page, in the browser. */
export async function exact(packed: Packed): Promise<Float64Array> {
  const bytes = await inflated(packed.data);
  return packed.kind === 'single' ? unshuffledSingle(bytes) : unshuffled(bytes);
}

export async function texts(packed: Packed): Promise<string[]> {
  return JSON.parse(new TextDecoder().decode(await inflated(packed.data))) as string[];
}

export async function field(packed: Packed): Promise<Float32Array> {
  if (packed.kind !== 'even' && packed.kind !== 'log') return Float32Array.from(await exact(packed));
  return valuesOf(packed, unpredicted(await inflated(packed.data), packed.columns));
}

async function inflated(base64: string): Promise<Uint8Array> {
  const text = atob(base64);
  const bytes = new Uint8Array(text.length);
  for (let i = 0; i < text.length; i++) bytes[i] = text.charCodeAt(i);
  const stream = new Blob([bytes]).stream().pipeThrough(new DecompressionStream('deflate-raw'));
  return new Uint8Array(await new Response(stream).arrayBuffer());
}
