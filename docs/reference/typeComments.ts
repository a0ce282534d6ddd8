import { fileURLToPath } from 'node:url';
import ts from 'typescript';

const SOURCE = fileURLToPath(new URL('../../src/study/results.ts', import.meta.url));

/**
 * What the comments of the type `Results` say, by path such as `fits[].ppm`. A property without a comment of its own takes
 * that of its type. The compiler holds type and schema of the results together, so the comments belong to both.
 */
export function typeComments(): Map<string, string> {
  const program = ts.createProgram([SOURCE], {
    target: ts.ScriptTarget.ES2022,
    module: ts.ModuleKind.NodeNext,
    moduleResolution: ts.ModuleResolutionKind.NodeNext,
    strict: true,
    noLib: false,
    skipLibCheck: true,
    types: ['node'],
  });
  const checker = program.getTypeChecker();
  const file = program.getSourceFile(SOURCE)!;
  const results = checker
    .getExportsOfModule(checker.getSymbolAtLocation(file)!)
    .find(({ name }) => name === 'Results')!;
  const comments = new Map<string, string>();
  gather(checker, checker.getDeclaredTypeOfSymbol(results), '', comments);
  return comments;
}

const plain = (parts: ts.SymbolDisplayPart[]): string =>
  ts
    .displayPartsToString(parts)
    .replace(/\{@link (\w+)\}/g, '`$1`')
    .replace(/\s+/g, ' ')
    .trim();

function gather(checker: ts.TypeChecker, type: ts.Type, path: string, comments: Map<string, string>): void {
  const outer = checker.getNonNullableType(type);
  const element = checker.isArrayType(outer)
    ? checker.getTypeArguments(outer as ts.TypeReference)[0]
    : undefined;
  const here = element === undefined ? outer : checker.getNonNullableType(element);
  const inside = element === undefined ? path : `${path}[]`;
  // methods and the like of texts, numbers and maps are none of the results' keys
  if ((here.flags & ts.TypeFlags.Object) === 0 && !here.isIntersection() && !here.isUnion()) return;
  for (const property of checker.getPropertiesOfType(here)) {
    const declared = property.valueDeclaration ?? property.declarations?.[0];
    if (declared?.getSourceFile().fileName.includes('node_modules')) continue;
    const key = inside === '' ? property.name : `${inside}.${property.name}`;
    const propertyType = checker.getTypeOfSymbol(property);
    const own = plain(property.getDocumentationComment(checker));
    const text = own === '' ? ofType(checker, propertyType) : own;
    if (text !== '' && !comments.has(key)) comments.set(key, text);
    gather(checker, propertyType, key, comments);
  }
}

/** The comment of the interface or alias that a type, or the elements of a list, were declared as. */
function ofType(checker: ts.TypeChecker, type: ts.Type): string {
  const outer = checker.getNonNullableType(type);
  const here = checker.isArrayType(outer) ? checker.getTypeArguments(outer as ts.TypeReference)[0]! : outer;
  const symbol = here.aliasSymbol ?? here.getSymbol();
  const declared = symbol?.declarations?.[0]?.getSourceFile().fileName ?? 'node_modules';
  return symbol === undefined || declared.includes('node_modules')
    ? ''
    : plain(symbol.getDocumentationComment(checker));
}
