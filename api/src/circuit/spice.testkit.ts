import { execFileSync, spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { EstimateRequest, Load } from '@lampwright/geometry/estimate';
import { ohmsOf, openVoltsOf } from './kirchhoff.testkit.js';

/** A netlist of one winding's worth of runs, and the names of the nodes whose volts are the fixtures' and terminals'. */
interface Netlist {
  readonly text: string;
  readonly probes: readonly string[];
}

/** The current of a load as an expression of the volts between its node and the return. */
function currentExpression(load: Load, node: string, open: number): string {
  const v = `v(${node})`;
  switch (load.kind) {
    case 'driver': {
      const va = load.watts / (load.powerFactor ?? 1);
      return `${v} >= ${load.minVolts} ? ${va}/${v} : ${v}*${va / load.minVolts ** 2}`;
    }
    case 'filament':
      // A power of 0.55 has no slope at 0 V, where a simulator may look: below 10 mV a straight line stands in.
      return `${v} >= 0.01 ? ${load.watts / load.ratedVolts}*(${v}/${load.ratedVolts})^0.55 : ${v}*${
        (load.watts / load.ratedVolts) * (0.01 / load.ratedVolts) ** 0.55 * 100
      }`;
    case 'resistive':
      return `${v}*${load.watts / load.ratedVolts ** 2}`;
    case 'current':
      return `${v} >= ${0.1 * open} ? ${load.amps} : ${v}*${load.amps / (0.1 * open)}`;
    case 'off':
      return '0';
  }
}

/** Each load as a behavioural current source, each winding's sag as a behavioural voltage source. */
export function netlistOf(request: EstimateRequest): Netlist {
  const lines = ['estimate', '.options reltol=1e-10 vntol=1e-10 abstol=1e-12 gmin=1e-15 itl1=500'];
  const probes: string[] = [];
  const temperature = request.conductorTemperatureC ?? 25;
  request.runs.forEach((run, r) => {
    const { open, sag, winding } = openVoltsOf(request, run);
    const numbers = new Map<string, string>();
    const nodeOf = (name: string) => {
      if (!numbers.has(name)) {
        numbers.set(name, name === run.source ? `t${r}` : `r${r}n${numbers.size}`);
        lines.push(`.nodeset v(${numbers.get(name)})=${open}`);
      }
      return numbers.get(name)!;
    };
    const drawn = request.runs.flatMap((other, o) =>
      openVoltsOf(request, other).winding === winding ? [`v(t${o})*i(vm${o})`] : [],
    );
    lines.push(
      `b${r} e${r} 0 v=${open}*(1-${sag}*(${drawn.join('+')}))`,
      `vm${r} e${r} ${nodeOf(run.source)} 0`,
    );
    run.cables.forEach((cable, k) => {
      lines.push(`r${r}k${k} ${nodeOf(cable.from)} ${nodeOf(cable.to)} ${ohmsOf(cable, temperature)}`);
    });
    run.fixtures.forEach((fixture, f) => {
      const many = fixture.quantity ?? 1;
      const at = nodeOf(fixture.at);
      const end = `r${r}f${f}`;
      lines.push(
        `rlead${r}x${f} ${at} ${end} ${fixture.lead ? ohmsOf(fixture.lead, temperature) / many : 1e-9}`,
      );
      lines.push(`.nodeset v(${end})=${open}`);
      lines.push(`bload${r}x${f} ${end} 0 i=${many}*(${currentExpression(fixture.load, end, open)})`);
      probes.push(end);
    });
    probes.push(nodeOf(run.source));
  });
  return { text: `${lines.join('\n')}\n.end\n`, probes };
}

/** Fails in words where ngspice is not installed: a missing reference must not look like an agreement. */
export function requireNgspice(): string {
  const found = spawnSync('ngspice', ['--version'], { encoding: 'utf8' });
  if (found.error) {
    throw new Error(
      'ngspice is not on PATH; install the Debian package `ngspice` to run this check against it.',
    );
  }
  return found.stdout;
}

/** Operating points of all netlists in one ngspice process: the probes' volts, netlist by netlist. */
export function operatingPoints(netlists: readonly Netlist[]): number[][] {
  const folder = mkdtempSync(join(tmpdir(), 'estimate-spice-'));
  try {
    const commands = ['.control', 'set numdgt=12', 'set noaskquit'];
    netlists.forEach(({ text, probes }, i) => {
      writeFileSync(join(folder, `${i}.cir`), text);
      commands.push(`source ${join(folder, `${i}.cir`)}`, 'op', `echo netlist ${i}`);
      for (const probe of probes) commands.push(`print v(${probe})`);
    });
    const script = join(folder, 'all.sp');
    writeFileSync(script, ['all', ...commands, 'quit', '.endc', '.end', ''].join('\n'));
    const output = join(folder, 'out.txt');
    execFileSync('ngspice', ['-b', '-n', '-o', output, script], { stdio: 'ignore', timeout: 120_000 });
    return readPoints(readFileSync(output, 'utf8'), netlists);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

function readPoints(output: string, netlists: readonly Netlist[]): number[][] {
  const parts = output.split(/^netlist \d+$/m).slice(1);
  if (parts.length !== netlists.length)
    throw new Error(`ngspice answered ${parts.length} of ${netlists.length}.`);
  return parts.map((part, i) => {
    const volts = [...part.matchAll(/^v\((\S+)\) = (\S+)$/gm)].map((match) => Number(match[2]));
    const wanted = netlists[i]!.probes.length;
    if (volts.length !== wanted) {
      throw new Error(
        `ngspice answered ${volts.length} of ${wanted} volts of netlist ${i}:\n${part.slice(0, 500)}`,
      );
    }
    return volts;
  });
}
