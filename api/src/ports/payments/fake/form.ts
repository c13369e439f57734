/** A value of a form: text, or a tree of them. */
export type FormValue = string | FormTree;
export interface FormTree {
  [name: string]: FormValue;
}

/** Reads a form whose names are paths, as in `line_items[0][price_data][currency]=usd`. */
export function readForm(text: string): FormTree {
  const form: FormTree = Object.create(null);
  for (const [name, value] of new URLSearchParams(text)) put(form, pathOf(name), value);
  return form;
}

const pathOf = (name: string): string[] => name.split('[').map((part) => part.replace(/\]$/, ''));

function put(tree: FormTree, [first = '', ...rest]: string[], value: string): void {
  if (rest.length === 0) {
    tree[first] = value;
    return;
  }
  const below = tree[first];
  const branch: FormTree = typeof below === 'object' ? below : Object.create(null);
  tree[first] = branch;
  put(branch, rest, value);
}

export function treeAt(tree: FormTree, ...path: string[]): FormTree {
  let at: FormValue = tree;
  for (const name of path) {
    if (typeof at !== 'object') return {};
    at = at[name] ?? {};
  }
  return typeof at === 'object' ? at : {};
}

/** Empty where there is none. */
export function textAt(tree: FormTree, ...path: string[]): string {
  const value = treeAt(tree, ...path.slice(0, -1))[path.at(-1) ?? ''];
  return typeof value === 'string' ? value : '';
}

export const textsIn = (tree: FormTree): Record<string, string> =>
  Object.fromEntries(
    Object.entries(tree).filter((entry): entry is [string, string] => typeof entry[1] === 'string'),
  );
