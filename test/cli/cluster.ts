import { execFileSync } from 'node:child_process';
import { randomBytes } from 'node:crypto';
import { chmodSync, existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { hostname, tmpdir } from 'node:os';
import { join } from 'node:path';
import { isAlive } from './sweeps.ts';

/** What is needed for a cluster of one node; the reason why there is none, or undefined. */
export function noCluster(): string | undefined {
  if (process.getuid?.() !== 0) return 'needs root to start Slurm';
  for (const command of ['munged', 'slurmctld', 'slurmd', 'sbatch']) {
    if (!['/usr/sbin', '/usr/bin', '/sbin', '/bin'].some((folder) => existsSync(join(folder, command)))) {
      return `needs Slurm: apt-get install slurm-wlm munge (${command} is missing)`;
    }
  }
  return undefined;
}

/** A real Slurm of one node, with its own files and daemons, stopped by their process ids. */
export class Cluster {
  readonly folder = mkdtempSync(join(tmpdir(), 'slurm-'));
  private readonly host = hostname().split('.')[0];

  get configuration(): string {
    return join(this.folder, 'slurm.conf');
  }

  /** Runs one of Slurm's commands and returns what it prints. */
  command(name: string, ...words: string[]): string {
    return execFileSync(name, words, { env: { ...process.env, SLURM_CONF: this.configuration }, encoding: 'utf8' });
  }

  async start(): Promise<void> {
    const munge = join(this.folder, 'munge');
    for (const folder of [munge, join(this.folder, 'state'), join(this.folder, 'spool')]) mkdirSync(folder);
    // others have to reach the socket
    chmodSync(this.folder, 0o755);
    chmodSync(munge, 0o711);
    writeFileSync(join(munge, 'key'), randomBytes(128), { mode: 0o400 });
    const inMunge = (name: string): string => join(munge, name);
    execFileSync('/usr/sbin/munged', [
      `--key-file=${inMunge('key')}`,
      `--socket=${inMunge('munge.socket')}`,
      `--pid-file=${inMunge('munged.pid')}`,
      `--log-file=${inMunge('munged.log')}`,
      `--seed-file=${inMunge('munged.seed')}`,
      '--force',
    ]);
    writeFileSync(this.configuration, this.text(munge));
    const env = { ...process.env, SLURM_CONF: this.configuration };
    execFileSync('/usr/sbin/slurmctld', ['-f', this.configuration], { env });
    execFileSync('/usr/sbin/slurmd', ['-f', this.configuration, '-N', this.host], { env });
    const end = Date.now() + 60_000;
    while (!this.command('sinfo', '--noheader', '--format=%t').includes('idle')) {
      if (Date.now() > end) throw new Error(`the node is not idle:\n${this.command('sinfo')}`);
      await new Promise((resolve) => setTimeout(resolve, 200));
    }
  }

  private text(munge: string): string {
    const node = /^NodeName=.*$/m.exec(execFileSync('/usr/sbin/slurmd', ['-C'], { encoding: 'utf8' }))?.[0].replace(/ UpTime.*$/, '');
    const file = (name: string): string => join(this.folder, name);
    return `ClusterName=swathe
SlurmctldHost=${this.host}(127.0.0.1)
SlurmUser=root
SlurmdUser=root
AuthType=auth/munge
AuthInfo=socket=${munge}/munge.socket
SlurmctldPort=16817
SlurmdPort=16818
MpiDefault=none
ProctrackType=proctrack/linuxproc
TaskPlugin=task/none
JobAcctGatherType=jobacct_gather/linux
AccountingStorageType=accounting_storage/none
JobCompType=jobcomp/filetxt
JobCompLoc=${file('completed.txt')}
SelectType=select/cons_tres
SelectTypeParameters=CR_Core_Memory
DefMemPerCPU=500
ReturnToService=2
SchedulerParameters=sched_interval=1,bf_interval=1
MaxArraySize=10
MinJobAge=10
KillWait=15
StateSaveLocation=${file('state')}
SlurmdSpoolDir=${file('spool')}
SlurmctldPidFile=${file('slurmctld.pid')}
SlurmdPidFile=${file('slurmd.pid')}
SlurmctldLogFile=${file('slurmctld.log')}
SlurmdLogFile=${file('slurmd.log')}
${node} NodeAddr=127.0.0.1 State=UNKNOWN
PartitionName=bench Nodes=${this.host} Default=YES MaxTime=INFINITE State=UP
`;
  }

  /** Ends the daemons and removes their files. */
  async stop(): Promise<void> {
    for (const file of ['slurmd.pid', 'slurmctld.pid', 'munge/munged.pid']) {
      const path = join(this.folder, file);
      if (!existsSync(path)) continue;
      const pid = Number(readFileSync(path, 'utf8'));
      process.kill(pid, 'SIGTERM');
      const end = Date.now() + 10_000;
      while (Date.now() < end && isAlive(pid)) await new Promise((resolve) => setTimeout(resolve, 100));
    }
    rmSync(this.folder, { recursive: true, force: true });
  }
}
