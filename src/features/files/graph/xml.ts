import { SaxesParser } from 'saxes';
import { fileErrors } from '../errors';
import { FIELD_BUFFER, type TextReader } from '../files';
import type { Dialect, GraphHandler } from './dialect';
import { gexf } from './gexf';
import { graphml } from './graphml';

/** Elements within elements; a graph needs about six. */
const DEEPEST = 200;
const local = (name: string): string => name.slice(name.indexOf(':') + 1);

/**
 * Drives a dialect over XML text, with saxes: it fetches nothing and knows no entities but XML's own five, and a file
 * that declares more is refused.
 */
export class GraphReader implements TextReader {
  private readonly parser = new SaxesParser({ xmlns: false, position: true });
  private dialect: Dialect | null = null;
  private depth = 0;
  private text = '';
  private quiet = 0;

  constructor(
    private readonly file: string,
    handler: GraphHandler,
  ) {
    const { parser } = this;
    parser.on('doctype', (doctype) => {
      if (/<!ENTITY/i.test(doctype)) throw fileErrors.entities(file);
    });
    parser.on('opentag', ({ name, attributes }) => {
      this.quiet = 0;
      if (++this.depth > DEEPEST) throw fileErrors.badXml(file, parser.line);
      const root = local(name);
      if (!this.dialect) {
        if (root !== 'gexf' && root !== 'graphml') throw fileErrors.otherXml(file);
        this.dialect = (root === 'gexf' ? gexf : graphml)(handler);
      }
      this.text = '';
      this.dialect.open({ name: root, attributes: attributes as Record<string, string>, line: parser.line });
    });
    const onText = (text: string): void => {
      if (this.text.length + text.length > FIELD_BUFFER) throw fileErrors.longField(file, parser.line);
      this.text += text;
    };
    parser.on('text', onText);
    parser.on('cdata', onText);
    parser.on('closetag', ({ name }) => {
      this.quiet = 0;
      this.depth--;
      this.dialect!.close(local(name), this.text);
      this.text = '';
    });
    parser.on('error', (error) => {
      throw error;
    });
  }

  write(text: string): void {
    this.quiet += text.length;
    if (this.quiet > FIELD_BUFFER) throw fileErrors.longField(this.file, this.parser.line);
    this.guard(() => void this.parser.write(text));
  }

  end(): void {
    this.guard(() => void this.parser.close());
    if (!this.dialect) throw fileErrors.noGraph(this.file);
  }

  private guard(step: () => void): void {
    try {
      step();
    } catch (error) {
      if ((error as { status?: number }).status) throw error;
      throw fileErrors.badXml(this.file, this.parser.line);
    }
  }
}
