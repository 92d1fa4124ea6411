// Names that patterns and statements declare.
import { child, children, field, isNode, type Node } from "./syntax.ts";

/** A function of its own, whose declarations stay inside. */
export const FUNCTIONS: ReadonlySet<string> = new Set([
  "FunctionDeclaration",
  "FunctionExpression",
  "ArrowFunctionExpression",
]);

/** Names that a declared pattern binds: `{ a, b: [c = 1, ...d] }` binds a, c, d. */
export function boundNames(pattern: Node): Node[] {
  switch (pattern.type) {
    case "Identifier":
      return [pattern];
    case "ObjectPattern":
      return children(pattern, "properties").flatMap((property) =>
        boundNames((property.type === "RestElement" ? child(property, "argument") : child(property, "value")) as Node),
      );
    case "ArrayPattern":
      return children(pattern, "elements").flatMap(boundNames);
    case "AssignmentPattern":
      return boundNames(child(pattern, "left") as Node);
    case "RestElement":
      return boundNames(child(pattern, "argument") as Node);
    case "TSParameterProperty":
      return boundNames(child(pattern, "parameter") as Node);
    default:
      return [];
  }
}

/** Names that a statement declares in its own block: let, const, class, function. */
export function blockNames(statement: Node): Node[] {
  switch (statement.type) {
    case "VariableDeclaration":
      if (field(statement, "kind") === "var") return [];
      return children(statement, "declarations").flatMap((one) => boundNames(child(one, "id") as Node));
    case "FunctionDeclaration":
    case "TSDeclareFunction":
    case "ClassDeclaration":
    case "TSEnumDeclaration":
      return [child(statement, "id") as Node];
    case "LabeledStatement":
      return blockNames(child(statement, "body") as Node);
    default:
      return [];
  }
}

/** Names that `var` lifts to the function from anywhere inside a statement, inner functions excepted. */
export function hoistedNames(node: Node): Node[] {
  if (FUNCTIONS.has(node.type) || node.type.startsWith("Class") || node.type.startsWith("TS")) return [];
  if (node.type === "VariableDeclaration") {
    if (field(node, "kind") !== "var") return [];
    return children(node, "declarations").flatMap((one) => boundNames(child(one, "id") as Node));
  }
  if (!/Statement$|^SwitchCase$|^CatchClause$/.test(node.type) || node.type === "ExpressionStatement") return [];
  return Object.values(node).flatMap((value) =>
    Array.isArray(value) ? value.filter(isNode).flatMap(hoistedNames) : isNode(value) ? hoistedNames(value) : [],
  );
}
