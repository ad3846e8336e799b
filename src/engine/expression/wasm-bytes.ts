/**
 * Bytes of a WebAssembly module: the few instructions that formulas need, and the sections around
 * them (WebAssembly Core Specification 1.0, chapter 5).
 */
export const WASM = {
  end: 0x0b,
  call: 0x10,
  select: 0x1b,
  localGet: 0x20,
  localSet: 0x21,
  load: 0x2b,
  store: 0x39,
  integerConstant: 0x41,
  constant: 0x44,
  equal: 0x61,
  notEqual: 0x62,
  less: 0x63,
  lessEqual: 0x65,
  abs: 0x99,
  negate: 0x9a,
  sqrt: 0x9f,
  add: 0xa0,
  subtract: 0xa1,
  multiply: 0xa2,
  divide: 0xa3,
  minimum: 0xa4,
  maximum: 0xa5,
  toDouble: 0xb8,
} as const;

const I32 = 0x7f;
export const F64 = 0x7c;

const scratch = new DataView(new ArrayBuffer(8));

/** A growing list of bytes. */
export class ByteList {
  private bytes = new Uint8Array(256);
  length = 0;

  push(byte: number): void {
    if (this.length === this.bytes.length) this.reserve(1);
    this.bytes[this.length] = byte;
    this.length += 1;
  }

  /** Unsigned LEB128. */
  unsigned(value: number): void {
    let rest = value;
    while (rest >= 0x80) {
      this.push((rest & 0x7f) | 0x80);
      rest >>>= 7;
    }
    this.push(rest);
  }

  double(value: number): void {
    scratch.setFloat64(0, value, true);
    for (let k = 0; k < 8; k += 1) this.push(scratch.getUint8(k));
  }

  text(value: string): void {
    this.unsigned(value.length);
    for (let k = 0; k < value.length; k += 1) this.push(value.charCodeAt(k));
  }

  append(other: ByteList): void {
    this.reserve(other.length);
    this.bytes.set(other.bytes.subarray(0, other.length), this.length);
    this.length += other.length;
  }

  /** The bytes so far, as a copy. */
  toArray(): Uint8Array<ArrayBuffer> {
    return this.bytes.slice(0, this.length);
  }

  private reserve(more: number): void {
    if (this.length + more <= this.bytes.length) return;
    const grown = new Uint8Array(Math.max(this.bytes.length * 2, this.length + more));
    grown.set(this.bytes);
    this.bytes = grown;
  }
}

/** Signatures: 0 prepare(), 1 evaluate(t: f64, u: i32, out: i32), 2 f64 -> f64, 3 (f64, f64) -> f64. */
const SIGNATURES = [
  [0x60, 0, 0],
  [0x60, 3, F64, I32, I32, 0],
  [0x60, 1, F64, 1, F64],
  [0x60, 2, F64, F64, 1, F64],
];
export const SIGNATURE = { prepare: 0, evaluate: 1, unary: 2, binary: 3 } as const;

export interface ModuleFunction {
  readonly name: string;
  readonly signature: number;
  /** Number of f64 locals besides the arguments. */
  readonly locals: number;
  /** Instructions without the closing end. */
  readonly body: ByteList;
}

/** A module that imports `env.memory` and functions of `math`, and exports the given functions. */
export function assembleModule(
  imports: readonly { readonly name: string; readonly signature: number }[],
  functions: readonly ModuleFunction[],
): Uint8Array<ArrayBuffer> {
  const out = new ByteList();
  for (const byte of [0, 0x61, 0x73, 0x6d, 1, 0, 0, 0]) out.push(byte);
  section(out, 1, (bytes) => {
    bytes.unsigned(SIGNATURES.length);
    for (const signature of SIGNATURES) for (const byte of signature) bytes.push(byte);
  });
  section(out, 2, (bytes) => {
    bytes.unsigned(imports.length + 1);
    bytes.text('env');
    bytes.text('memory');
    for (const byte of [2, 0, 1]) bytes.push(byte);
    for (const { name, signature } of imports) {
      bytes.text('math');
      bytes.text(name);
      bytes.push(0);
      bytes.unsigned(signature);
    }
  });
  section(out, 3, (bytes) => {
    bytes.unsigned(functions.length);
    for (const { signature } of functions) bytes.unsigned(signature);
  });
  section(out, 7, (bytes) => {
    bytes.unsigned(functions.length);
    functions.forEach(({ name }, k) => {
      bytes.text(name);
      bytes.push(0);
      bytes.unsigned(imports.length + k);
    });
  });
  section(out, 10, (bytes) => {
    bytes.unsigned(functions.length);
    for (const each of functions) bytes.append(functionBody(each));
  });
  return out.toArray();
}

function functionBody({ locals, body }: ModuleFunction): ByteList {
  const head = new ByteList();
  head.unsigned(locals === 0 ? 0 : 1);
  if (locals > 0) {
    head.unsigned(locals);
    head.push(F64);
  }
  const sized = new ByteList();
  sized.unsigned(head.length + body.length + 1);
  sized.append(head);
  sized.append(body);
  sized.push(WASM.end);
  return sized;
}

function section(out: ByteList, id: number, write: (bytes: ByteList) => void): void {
  const bytes = new ByteList();
  write(bytes);
  out.push(id);
  out.unsigned(bytes.length);
  out.append(bytes);
}
