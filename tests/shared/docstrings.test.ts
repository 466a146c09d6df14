import { readdirSync, readFileSync } from 'node:fs';
import { join, relative } from 'node:path';
import vm from 'node:vm';
import ts from 'typescript';

const root = join(__dirname, '../..');

type Documented = { file: string; name: string; doc: string; example: string | null };

/** The chain of screens still runs through this one; it goes when the chain takes its place. */
const leaves = 'shared/flow/correctReading.ts';

const files = ['shared/flow', 'shared/units'].flatMap((folder) =>
  readdirSync(join(root, folder), { recursive: true, encoding: 'utf8' })
    .filter((name) => name.endsWith('.ts'))
    .map((name) => join(root, folder, name)),
);

/** Exported functions of a file with their docstrings. */
function documentedIn(path: string): Documented[] {
  const source = ts.createSourceFile(path, readFileSync(path, 'utf8'), ts.ScriptTarget.Latest, true);
  return source.statements.flatMap((statement) => {
    const isExported =
      ts.canHaveModifiers(statement) &&
      ts.getModifiers(statement)?.some((modifier) => modifier.kind === ts.SyntaxKind.ExportKeyword);
    if (!ts.isFunctionDeclaration(statement) || !isExported) return [];
    const raw = ts
      .getLeadingCommentRanges(source.text, statement.pos)
      ?.map((range) => source.text.slice(range.pos, range.end))
      .at(-1);
    const doc = (raw ?? '').replace(/\*\/$/, '').replace(/^\s*\*/gm, '');
    const example = /@example\s+([\s\S]+?)$/.exec(doc.trim())?.[1] ?? null;
    return [{ file: relative(root, path), name: statement.name?.text ?? '', doc, example }];
  });
}

const functions = files.flatMap(documentedIn).filter(({ file }) => file !== leaves);

/** Compares a value with a literal as printed: a number within half a unit of its last digit, of an object the keys that
 * are named. */
function expectPrinted(got: unknown, literal: ts.Expression): void {
  if (ts.isObjectLiteralExpression(literal)) {
    for (const property of literal.properties) {
      if (!ts.isPropertyAssignment(property)) throw new Error('an example lists plain values');
      const key = (property.name as ts.Identifier).text;
      expect(Object.keys(got as object)).toContain(key);
      expectPrinted((got as Record<string, unknown>)[key], property.initializer);
    }
  } else if (ts.isArrayLiteralExpression(literal)) {
    expect(got).toHaveLength(literal.elements.length);
    literal.elements.forEach((element, i) => expectPrinted((got as unknown[])[i], element));
  } else if (ts.isNumericLiteral(literal) || ts.isPrefixUnaryExpression(literal)) {
    const text = literal.getText();
    const [mantissa = '', power = '0'] = text.split('e');
    const decimals = (mantissa.split('.')[1] ?? '').length - Number(power);
    const slack = text.includes('.') || text.includes('e') ? 0.5 * 10 ** -decimals : 0;
    expect(Math.abs((got as number) - Number(text))).toBeLessThanOrEqual(slack * (1 + 1e-9));
  } else expect(got).toEqual(vm.runInNewContext(literal.getText()));
}

it('finds the functions it is to judge', () => {
  expect(functions.length).toBeGreaterThan(20);
  expect(functions.map(({ name }) => name)).toContain('flowM3PerS');
});

it.each(functions)('$file $name says parameters, return, throws, range, source and example', ({ doc }) => {
  for (const part of ['@returns', '@throws', '@example', 'Range', 'Source']) expect(doc).toContain(part);
  expect(doc).toMatch(/@param/);
});

it.each(functions)('$file $name: its example gives what it prints', ({ file, example }) => {
  const scope = Object.assign({}, ...files.map((path) => require(path) as object), require(join(root, file)));
  const parsed = ts.createSourceFile('example.ts', example ?? '', ts.ScriptTarget.Latest, true);
  const statement = parsed.statements[0];
  const printed = /\/\/([\s\S]*)$/.exec(example ?? '')?.[1]?.trim() ?? '';
  if (!statement || !printed) throw new Error('no example of the form: call // result');
  const call = statement.getText();
  if (printed.startsWith('throws')) return expect(() => vm.runInNewContext(call, scope) as unknown).toThrow();
  const literal = ts.createSourceFile('printed.ts', `(${printed})`, ts.ScriptTarget.Latest, true)
    .statements[0] as ts.ExpressionStatement;
  expectPrinted(
    vm.runInNewContext(`(${call.replace(/;$/, '')})`, scope),
    (literal.expression as ts.ParenthesizedExpression).expression,
  );
});
