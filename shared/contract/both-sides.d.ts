// The few globals that browsers and Node share and that the contract may use. Only this floor's tsconfig reads it:
// the others have them from the DOM or from Node.
declare class TextEncoder {
  encode(text: string): Uint8Array;
}
declare class URL {
  constructor(url: string, base?: string);
  readonly protocol: string;
  readonly origin: string;
  readonly pathname: string;
}
