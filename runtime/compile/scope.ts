// Scope analysis: which names does a piece of code read or write that it doesn't declare itself? A reference inside a type is none.
import { blockNames, boundNames, FUNCTIONS, hoistedNames } from "./declared-names.ts";
import { child, children, field, identifierName, isNode, isWrapper, type Node, unwrapped } from "./syntax.ts";

export interface Reference {
  name: string;
  node: Node;
  /** assigned to, counted up, or the target of a destructuring assignment */
  write: boolean;
  /** inside a function that is not called on the spot: evaluated later, if at all */
  deferred: boolean;
  /** `typeof x`, which is no error for a name that doesn't exist */
  probed: boolean;
}

export interface FreeNames {
  references: Reference[];
  /** calls, `new` excluded, whose function is a name or a path of names from outside */
  calls: Node[];
  /** awaits outside of any inner function */
  awaits: boolean;
  /** enums and namespaces inside: TypeScript that leaves code behind */
  unerasable: Node[];
}

interface Scope {
  names: Set<string>;
  parent?: Scope;
}

interface Place {
  scope: Scope;
  deferred: boolean;
  /** inside a function of the code itself: its awaits are its own */
  inner: boolean;
}

/**
 * Names that `nodes` take from outside.
 * @param nodes    expressions, statements or patterns, in order
 * @param patterns declared patterns whose defaults and computed keys count (their bound names are the caller's)
 */
export function freeNames(nodes: readonly Node[], patterns: readonly Node[] = []): FreeNames {
  const found: FreeNames = { references: [], calls: [], awaits: false, unerasable: [] };
  const place: Place = { scope: { names: new Set() }, deferred: false, inner: false };
  for (const pattern of patterns) visitBinding(pattern, place, found);
  for (const node of nodes) visit(node, place, found);
  return found;
}

function isFree(name: string, scope: Scope): boolean {
  for (let at: Scope | undefined = scope; at; at = at.parent) if (at.names.has(name)) return false;
  return true;
}

function refer(node: Node, place: Place, found: FreeNames, how: { write?: boolean; probed?: boolean } = {}): void {
  const name = identifierName(node);
  if (!isFree(name, place.scope)) return;
  found.references.push({
    name,
    node,
    write: how.write ?? false,
    probed: how.probed ?? false,
    deferred: place.deferred,
  });
}

function visitAll(nodes: readonly Node[], place: Place, found: FreeNames): void {
  for (const node of nodes) visit(node, place, found);
}

function visit(node: Node, place: Place, found: FreeNames): void {
  if (FUNCTIONS.has(node.type)) {
    visitFunction(node, place, found, false);
    return;
  }
  switch (node.type) {
    case "Identifier":
      refer(node, place, found);
      return;
    case "UnaryExpression": {
      const argument = child(node, "argument") as Node;
      const probed = field(node, "operator") === "typeof" && argument.type === "Identifier";
      if (probed) refer(argument, place, found, { probed });
      else visit(argument, place, found);
      return;
    }
    case "AssignmentExpression":
      visitTarget(child(node, "left") as Node, place, found);
      visit(child(node, "right") as Node, place, found);
      return;
    case "UpdateExpression":
      visitTarget(child(node, "argument") as Node, place, found);
      return;
    case "MemberExpression":
      visit(child(node, "object") as Node, place, found);
      if (field(node, "computed")) visit(child(node, "property") as Node, place, found);
      return;
    case "CallExpression":
      visitCall(node, place, found);
      return;
    case "AwaitExpression":
      if (!place.inner) found.awaits = true;
      visit(child(node, "argument") as Node, place, found);
      return;
    case "Property":
      if (field(node, "computed")) visit(child(node, "key") as Node, place, found);
      visit(child(node, "value") as Node, place, found);
      return;
    case "ClassDeclaration":
    case "ClassExpression":
      visitClass(node, place, found);
      return;
    case "VariableDeclaration":
      if (field(node, "declare")) return;
      for (const declarator of children(node, "declarations")) {
        visitBinding(child(declarator, "id") as Node, place, found);
        const init = child(declarator, "init");
        if (init) visit(init, place, found);
      }
      return;
    case "BlockStatement":
      visitBlock(children(node, "body"), place, found);
      return;
    case "StaticBlock":
      visitFunctionBody(children(node, "body"), { ...place, inner: true }, found);
      return;
    case "ForStatement":
    case "ForInStatement":
    case "ForOfStatement":
      visitLoop(node, place, found);
      return;
    case "SwitchStatement":
      visit(child(node, "discriminant") as Node, place, found);
      visitSwitch(children(node, "cases"), place, found);
      return;
    case "CatchClause": {
      const parameter = child(node, "param");
      const inner = within(place, parameter ? boundNames(parameter) : []);
      if (parameter) visitBinding(parameter, inner, found);
      visit(child(node, "body") as Node, inner, found);
      return;
    }
    case "LabeledStatement":
      visit(child(node, "body") as Node, place, found);
      return;
    case "BreakStatement":
    case "ContinueStatement":
    case "MetaProperty":
    case "PrivateName":
    case "PrivateIdentifier":
      return;
  }
  if (isWrapper(node)) {
    visit(child(node, "expression") as Node, place, found);
    return;
  }
  if (node.type === "TSEnumDeclaration" || node.type === "TSModuleDeclaration") found.unerasable.push(node);
  if (node.type.startsWith("TS")) return;
  for (const value of Object.values(node)) {
    if (Array.isArray(value)) visitAll(value.filter(isNode), place, found);
    else if (isNode(value)) visit(value, place, found);
  }
}

function visitCall(node: Node, place: Place, found: FreeNames): void {
  const callee = child(node, "callee") as Node;
  const called = unwrapped(callee);
  // A function called where it is written runs at once; so does what it reads.
  if (FUNCTIONS.has(called.type)) visitFunction(called, place, found, true);
  else visit(callee, place, found);
  let root = called;
  while (root.type === "MemberExpression") root = unwrapped(child(root, "object") as Node);
  if (root.type === "Identifier" && isFree(identifierName(root), place.scope)) found.calls.push(node);
  visitAll(children(node, "arguments"), place, found);
}

function visitFunction(node: Node, place: Place, found: FreeNames, onTheSpot: boolean): void {
  const parameters = children(node, "params");
  const own = child(node, "id");
  const names = new Set(parameters.flatMap(boundNames).map(identifierName));
  if (own && node.type === "FunctionExpression") names.add(identifierName(own));
  if (node.type !== "ArrowFunctionExpression") names.add("arguments");
  const inner: Place = {
    scope: { names, parent: place.scope },
    deferred: place.deferred || !onTheSpot,
    inner: true,
  };
  // Defaults of parameters see the other parameters, not what the body declares.
  for (const parameter of parameters) visitBinding(parameter, inner, found);
  const body = child(node, "body");
  // An abstract method has none.
  if (!body) return;
  if (body.type === "BlockStatement") visitFunctionBody(children(body, "body"), inner, found);
  else visit(body, inner, found);
}

function visitFunctionBody(statements: readonly Node[], place: Place, found: FreeNames): void {
  const hoisted = statements.flatMap(hoistedNames);
  visitBlock(statements, within(place, hoisted), found);
}

function visitBlock(statements: readonly Node[], place: Place, found: FreeNames): void {
  visitAll(statements, within(place, statements.flatMap(blockNames)), found);
}

function visitLoop(node: Node, place: Place, found: FreeNames): void {
  const head = child(node, "init") ?? child(node, "left");
  const inner = within(place, head ? blockNames(head) : []);
  if (field(node, "await") && !place.inner) found.awaits = true;
  if (head?.type === "VariableDeclaration") visit(head, inner, found);
  else if (head && node.type === "ForStatement") visit(head, inner, found);
  else if (head) visitTarget(head, inner, found);
  for (const key of ["right", "test", "update", "body"]) {
    const part = child(node, key);
    if (part) visit(part, inner, found);
  }
}

function visitSwitch(cases: readonly Node[], place: Place, found: FreeNames): void {
  const inner = within(place, cases.flatMap((one) => children(one, "consequent")).flatMap(blockNames));
  for (const one of cases) {
    const test = child(one, "test");
    if (test) visit(test, inner, found);
    visitAll(children(one, "consequent"), inner, found);
  }
}

function visitClass(node: Node, place: Place, found: FreeNames): void {
  const own = child(node, "id");
  const inner = within(place, own ? [own] : []);
  const parent = child(node, "superClass");
  if (parent) visit(parent, inner, found);
  for (const member of children(child(node, "body") as Node, "body")) {
    if (member.type.startsWith("TS")) continue;
    if (member.type === "StaticBlock") {
      visit(member, inner, found);
      continue;
    }
    const key = child(member, "key");
    if (key && field(member, "computed")) visit(key, inner, found);
    const value = child(member, "value");
    if (!value || field(member, "declare")) continue;
    // Static fields are evaluated with the class; methods and fields of an instance later, and with awaits of their own.
    const later = member.type === "MethodDefinition" || !field(member, "static");
    const names = new Set(["arguments"]);
    const scope = { names, parent: inner.scope };
    visit(value, { scope, deferred: inner.deferred || later, inner: true }, found);
  }
}

/** A declared pattern: only its defaults and computed keys are read. */
function visitBinding(pattern: Node, place: Place, found: FreeNames): void {
  walkPattern(pattern, place, found, () => {});
}

/** The left side of an assignment: names are written, members are read up to their last point. */
function visitTarget(target: Node, place: Place, found: FreeNames): void {
  walkPattern(target, place, found, (leaf) => {
    const inner = unwrapped(leaf);
    if (inner.type === "Identifier") refer(inner, place, found, { write: true });
    else visit(inner, place, found);
  });
}

function walkPattern(pattern: Node, place: Place, found: FreeNames, leaf: (node: Node) => void): void {
  const walk = (node: Node | undefined) => node && walkPattern(node, place, found, leaf);
  switch (pattern.type) {
    case "ObjectPattern":
      for (const property of children(pattern, "properties")) {
        if (property.type === "RestElement") walk(child(property, "argument"));
        else {
          if (field(property, "computed")) visit(child(property, "key") as Node, place, found);
          walk(child(property, "value"));
        }
      }
      return;
    case "ArrayPattern":
      for (const element of children(pattern, "elements")) walk(element);
      return;
    case "AssignmentPattern":
      walk(child(pattern, "left"));
      visit(child(pattern, "right") as Node, place, found);
      return;
    case "RestElement":
      walk(child(pattern, "argument"));
      return;
    case "TSParameterProperty":
      walk(child(pattern, "parameter"));
      return;
    default:
      leaf(pattern);
      return;
  }
}

function within(place: Place, names: readonly Node[]): Place {
  if (names.length === 0) return place;
  return { ...place, scope: { names: new Set(names.map(identifierName)), parent: place.scope } };
}
