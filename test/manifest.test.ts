// The program refuses a manifest that breaks one of its rules without saying which. Its schema is not to be had offline, so the rules
// that matter are held here.

import { readFileSync } from 'node:fs';
import path from 'node:path';
import { SaxesParser } from 'saxes';
import ts from 'typescript';
import { describe, expect, it } from 'vitest';
import { manifestFor } from '../manifest/manifest-for.js';
import { NAMESPACE } from '../src/host/sheet/functions-runtime';
import { dist, siteFile } from './support/browser';

const BASE = 'https://localhost:3000';
const built = readFileSync(path.join(dist, 'manifest.xml'), 'utf8');
const manifest = parse(built);

describe('the manifest', () => {
  it('has its parts in the order that the schema wants', () => {
    expect([manifest.name, manifest.attributes['xsi:type']]).toEqual(['OfficeApp', 'TaskPaneApp']);
    expect(manifest.children.map(({ name }) => name)).toEqual([
      'Id', 'Version', 'ProviderName', 'DefaultLocale', 'DisplayName', 'Description', 'IconUrl', 'HighResolutionIconUrl', 'SupportUrl',
      'Hosts', 'Requirements', 'DefaultSettings', 'Permissions', 'VersionOverrides',
    ]);
    expect(only('VersionOverrides').children.map(({ name }) => name)).toEqual(['Hosts', 'Resources']);
    expect(only('DesktopFormFactor').children.map(({ name }) => name)).toEqual(['GetStarted', 'FunctionFile', 'ExtensionPoint']);
    expect(only('Resources').children.map(({ name }) => name)).toEqual(['bt:Images', 'bt:Urls', 'bt:ShortStrings', 'bt:LongStrings']);
  });

  it('says who it is: an id of its own, the version of the package in four numbers, brief texts', () => {
    const { version } = JSON.parse(readFileSync(path.join(import.meta.dirname, '../package.json'), 'utf8')) as { version: string };
    expect(only('Id').text).toMatch(/^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/);
    expect(only('Version').text).toBe(`${version}.0`);
    expect(only('Version').text).toMatch(/^\d+(\.\d+){3}$/);
    expect(only('DisplayName').attributes.DefaultValue!.length).toBeLessThanOrEqual(125);
    expect(manifest.children.find(({ name }) => name === 'Description')!.attributes.DefaultValue!.length).toBeLessThanOrEqual(250);
  });

  it('asks for a workbook that it may write to, in one program, and trusts no other site', () => {
    expect(manifest.children.find(({ name }) => name === 'Hosts')!.children.map(({ attributes }) => attributes.Name)).toEqual(['Workbook']);
    expect(only('Permissions').text).toBe('ReadWriteDocument');
    expect(all('AppDomain')).toEqual([]);
  });

  it('runs the pane, the functions and the commands in one page that lives on', () => {
    const { resid, lifetime } = only('Runtime').attributes;
    const location = (part: Element) => part.children.find(({ name }) => name === 'SourceLocation')!.attributes.resid;
    expect(lifetime).toBe('long');
    expect([location(only('Page')), only('FunctionFile').attributes.resid, location(only('Action'))]).toEqual([resid, resid, resid]);
    expect(all('TaskpaneId')).toEqual([]);
    expect(resource(resid!)).toBe(only('DefaultSettings').children[0]!.attributes.DefaultValue);
  });

  it('names the namespace that formulas use, and the files of the functions', () => {
    const location = (part: string) => resource(only(part).children[0]!.attributes.resid!);
    expect(resource(only('Namespace').attributes.resid!)).toBe(NAMESPACE);
    expect([location('Script'), location('Metadata')]).toEqual([`${BASE}/functions.js`, `${BASE}/functions.json`]);
  });

  it('uses every resource that it defines, and defines every one that it uses, once', () => {
    const defined = only('Resources').children.flatMap(({ children }) => children.map(({ attributes }) => attributes.id!));
    const used = elements(manifest).flatMap(({ attributes }) => (attributes.resid === undefined ? [] : [attributes.resid]));
    expect(new Set(defined).size).toBe(defined.length);
    expect([...new Set(used)].toSorted()).toEqual(defined.toSorted());
  });

  it('keeps ids and texts within the lengths that the program takes', () => {
    for (const { attributes: { id } } of elements(only('Resources')).filter(({ attributes }) => attributes.id)) expect(id!.length, id).toBeLessThanOrEqual(32);
    const longest = (part: string) => Math.max(...only(part).children.map(({ attributes }) => attributes.DefaultValue!.length));
    expect(longest('bt:ShortStrings')).toBeLessThanOrEqual(125);
    expect(longest('bt:LongStrings')).toBeLessThanOrEqual(250);
    const controls = elements(manifest).filter(({ name }) => name === 'Group' || name === 'Control').map(({ attributes }) => attributes.id!);
    expect(new Set(controls).size).toBe(controls.length);
    for (const id of controls) expect(id.length, id).toBeLessThanOrEqual(125);
  });

  it('has all its addresses on the site, and the site holds what they name', () => {
    const addresses = addressesOf(manifest);
    expect(addresses.length).toBeGreaterThan(10);
    for (const address of addresses) {
      expect(address.startsWith(`${BASE}/`), address).toBe(true);
      expect(siteFile(address.slice(BASE.length)), address).not.toBeNull();
    }
  });

  it('follows the site to another address', () => {
    const base = 'https://plan.example/tools/foldplan';
    const moved = addressesOf(parse(manifestFor(base, '1.2.3')));
    expect(moved).toEqual(addressesOf(manifest).map((address) => address.replace(BASE, base)));
    expect(manifestFor(base, '1.2.3')).not.toMatch(/\{\{|localhost/);
  });

  it('shows icons in the sizes that it says, those that the program insists on among them', () => {
    for (const icon of all('Icon')) {
      const sizes = icon.children.map(({ attributes }) => Number(attributes.size));
      expect(sizes).toEqual(expect.arrayContaining([16, 32, 80]));
      for (const { attributes: { size, resid } } of icon.children) expect(pngSize(resource(resid!)), resid).toEqual([Number(size), Number(size)]);
    }
    expect(pngSize(only('IconUrl').attributes.DefaultValue!)).toEqual([32, 32]);
    expect(pngSize(only('HighResolutionIconUrl').attributes.DefaultValue!)).toEqual([64, 64]);
  });

  it('requires the versions of the program that the code needs, and no later ones', () => {
    const required = Object.fromEntries(all('Set').map(({ attributes }) => [attributes.Name!, attributes.MinVersion!]));
    // The shared page needs its set without calling anything of it.
    expect(required).toEqual({ ...setsCalled(['src/main-office.ts', 'src/functions/index.ts']), SharedRuntime: '1.1' });
  });
});

interface Element {
  name: string;
  attributes: Record<string, string>;
  children: Element[];
  text: string;
}

/** @throws Error where the text is not well-formed, namespaces included */
function parse(xml: string): Element {
  const parser = new SaxesParser({ xmlns: true });
  const root: Element = { name: '', attributes: {}, children: [], text: '' };
  const open = [root];
  parser.on('error', (error) => {
    throw error;
  });
  parser.on('opentag', ({ name, attributes }) => {
    const values = Object.fromEntries(Object.entries(attributes).map(([key, { value }]) => [key, value]));
    const element: Element = { name, attributes: values, children: [], text: '' };
    open.at(-1)!.children.push(element);
    open.push(element);
  });
  parser.on('text', (text) => {
    open.at(-1)!.text += text;
  });
  parser.on('closetag', () => open.pop());
  parser.write(xml).close();
  return root.children[0]!;
}

function elements(within: Element): Element[] {
  return [within, ...within.children.flatMap(elements)];
}

function all(name: string): Element[] {
  return elements(manifest).filter((element) => element.name === name);
}

function only(name: string): Element {
  const found = all(name);
  expect(found.length, name).toBe(1);
  return found[0]!;
}

function resource(id: string): string {
  return elements(only('Resources')).find(({ attributes }) => attributes.id === id)!.attributes.DefaultValue!;
}

function addressesOf(within: Element): string[] {
  return elements(within).map(({ attributes }) => attributes.DefaultValue ?? '').filter((value) => /^\w+:\/\//.test(value));
}

/** Width and height as the file itself tells. */
function pngSize(address: string): [number, number] {
  const { body } = siteFile(address.slice(BASE.length))!;
  expect(body.toString('latin1', 1, 4)).toBe('PNG');
  return [body.readUInt32BE(16), body.readUInt32BE(20)];
}

/** The latest set of each kind that the code needs: every member of the vendor's libraries is declared with its own. */
function setsCalled(entries: string[]): Record<string, string> {
  const root = path.join(import.meta.dirname, '..');
  const { config } = ts.readConfigFile(path.join(root, 'tsconfig.json'), (file) => readFileSync(file, 'utf8')) as { config: object };
  const { options } = ts.parseJsonConfigFileContent(config, ts.sys, root);
  const program = ts.createProgram(entries.map((file) => path.join(root, file)), options);
  const checker = program.getTypeChecker();
  const latest: Record<string, string> = {};
  const note = (declaration: ts.Declaration) => {
    if (!/@types\/(office-js|custom-functions-runtime)\//.test(declaration.getSourceFile().fileName)) return;
    const [, set, version] = /\[Api set: (\w+) ([\d.]+)\]/.exec(declaration.getFullText().slice(0, declaration.getLeadingTriviaWidth())) ?? [];
    if (set && compareVersions(version!, latest[set] ?? '0') > 0) latest[set] = version!;
  };
  const visit = (node: ts.Node): void => {
    if (ts.isIdentifier(node)) checker.getSymbolAtLocation(node)?.declarations?.forEach(note);
    ts.forEachChild(node, visit);
  };
  for (const file of program.getSourceFiles()) if (file.fileName.startsWith(path.join(root, 'src'))) visit(file);
  return latest;
}

function compareVersions(one: string, other: string): number {
  const [a = 0, b = 0] = one.split('.').map(Number);
  const [c = 0, d = 0] = other.split('.').map(Number);
  return a - c || b - d;
}
