import { CST, Lexer } from 'yaml';
import { NO_CONTROL_CHARACTERS, unprintableAt } from '../contracts/values';

/** What a file may be at most. A long production has some 60 000 words and marks; the rest is room to spare. */
export const LIMITS = {
  bytes: 5 * 1024 * 1024,
  /** Words and marks of the YAML text. */
  tokens: 600_000,
  /** Values, counted again wherever an alias repeats them. */
  values: 300_000,
  depth: 60,
  /** Columns of indentation. */
  indent: 400,
  /** Faults that are told one by one. */
  faults: 1000,
} as const;

/** A fault of the text as a whole: where it stands, as an offset, and what was expected. */
export interface TextFault {
  offset: number;
  expected: string;
}

function bytesOf(text: string): number {
  let bytes = text.length;
  for (let at = 0; at < text.length; at++) {
    const code = text.charCodeAt(at);
    if (code > 0x7f) bytes += code > 0x7ff && (code < 0xd800 || code > 0xdfff) ? 2 : 1;
  }
  return bytes;
}

/** What keeps a text from being read at all; everything here costs time in proportion to the text, whatever it holds. */
export function textFault(text: string): TextFault | undefined {
  if (bytesOf(text) > LIMITS.bytes) return { offset: 0, expected: 'a file of at most 5 MB' };
  const strange = unprintableAt(text);
  if (strange >= 0) return { offset: strange, expected: NO_CONTROL_CHARACTERS };
  return sizeFault(text);
}

function sizeFault(text: string): TextFault | undefined {
  const tooDeep = `values nested at most ${LIMITS.depth} deep`;
  let offset = 0;
  let tokens = 0;
  let flow = 0;
  let inLine = 0;
  let lineStarts = true;
  for (const source of new Lexer().lex(text)) {
    if (++tokens > LIMITS.tokens) return { offset, expected: `a file of at most ${LIMITS.tokens} words and marks` };
    switch (CST.tokenType(source)) {
      case 'newline':
        inLine = 0;
        lineStarts = true;
        break;
      case 'flow-map-start':
      case 'flow-seq-start':
        flow++;
        break;
      case 'flow-map-end':
      case 'flow-seq-end':
        flow = Math.max(0, flow - 1);
        break;
      case 'seq-item-ind':
      case 'explicit-key-ind':
      case 'map-value-ind':
        // In a flow collection a line may hold any number of fields; outside of one each mark opens a level.
        if (flow === 0) inLine++;
        break;
      case 'space':
        if (lineStarts && source.length > LIMITS.indent) return { offset, expected: `lines indented by at most ${LIMITS.indent} spaces` };
    }
    if (source !== '\n' && source !== '\r\n') lineStarts = false;
    if (flow > LIMITS.depth || inLine > LIMITS.depth) return { offset, expected: tooDeep };
    // Markers of the lexer (document, start of a scalar) are no part of the text.
    if (!isMarker(source)) offset += source.length;
  }
  return undefined;
}

const isMarker = (source: string) => source === CST.DOCUMENT || source === CST.FLOW_END || source === CST.SCALAR;
