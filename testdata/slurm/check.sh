#!/usr/bin/env bash
# Runs parts.sbatch and merge.sbatch on a real Slurm of one node on the loopback interface, and compares
# the files with those of the same parts run by hand and under xargs -P, byte for byte. For root on Debian;
# installs slurm-wlm and munge if they are missing. All it starts it ends; it changes no file of the system.
set -euo pipefail
cd "$(dirname "$0")/../.."

if [ "$(id -u)" -ne 0 ]; then
	echo "check.sh: needs root, to start Slurm" >&2
	exit 1
fi
if ! command -v slurmctld >/dev/null || ! command -v slurmd >/dev/null || ! command -v munged >/dev/null; then
	apt-get update -qq
	DEBIAN_FRONTEND=noninteractive apt-get install -y -qq --no-install-recommends slurm-wlm munge >/dev/null
fi

work=$(mktemp -d)
pids=()
finish() {
	status=$?
	for p in "${pids[@]}"; do kill "$p" 2>/dev/null || true; done
	for p in "${pids[@]}"; do wait "$p" 2>/dev/null || true; done
	if [ "$status" -ne 0 ]; then
		tail -n 20 "$work"/*.log "$work"/run/*.txt 2>/dev/null || true
	fi
	rm -rf "$work"
	exit "$status"
}
trap finish EXIT

# wait_for SECONDS COMMAND… waits until the command succeeds.
wait_for() {
	local end=$((SECONDS + $1))
	shift
	until "$@" >/dev/null 2>&1; do
		if [ "$SECONDS" -ge "$end" ]; then
			echo "check.sh: gave up waiting for: $*" >&2
			return 1
		fi
		sleep 0.2
	done
}

echo "== legwright"
go build -o "$work/legwright" ./cmd/legwright
export LEGWRIGHT=$work/legwright

echo "== munge and slurm"
chmod 0755 "$work"
mkdir -m 0755 "$work/munge" "$work/state" "$work/spool"
head -c 1024 /dev/urandom >"$work/munge/key"
chmod 0600 "$work/munge/key"
munged --foreground --force --key-file="$work/munge/key" --socket="$work/munge/socket" --pid-file="$work/munge/pid" \
	--log-file="$work/munge.log" --seed-file="$work/munge/seed" >/dev/null 2>&1 &
pids+=($!)
wait_for 20 test -S "$work/munge/socket"

node=$(hostname -s)
export SLURM_CONF=$work/slurm.conf
cat >"$SLURM_CONF" <<CONF
ClusterName=check
SlurmctldHost=$node(127.0.0.1)
SlurmctldPort=16817
SlurmdPort=16818
SlurmUser=root
SlurmdUser=root
AuthType=auth/munge
AuthInfo=socket=$work/munge/socket
CryptoType=crypto/munge
StateSaveLocation=$work/state
SlurmdSpoolDir=$work/spool
SlurmctldPidFile=$work/slurmctld.pid
SlurmdPidFile=$work/slurmd.pid
SlurmctldLogFile=$work/slurmctld.log
SlurmdLogFile=$work/slurmd.log
ProctrackType=proctrack/pgid
TaskPlugin=task/none
SwitchType=switch/none
MpiDefault=none
SelectType=select/cons_tres
SelectTypeParameters=CR_CPU
SchedulerType=sched/builtin
JobAcctGatherType=jobacct_gather/none
AccountingStorageType=accounting_storage/none
ReturnToService=2
NodeName=$node NodeAddr=127.0.0.1 CPUs=2 State=UNKNOWN
PartitionName=all Nodes=$node Default=YES MaxTime=INFINITE State=UP
CONF
slurmctld -D -c >/dev/null 2>&1 &
pids+=($!)
slurmd -D -N "$node" >/dev/null 2>&1 &
pids+=($!)
wait_for 60 sh -c 'sinfo -h -o %T | grep -q "^idle"'

brief=$PWD/testdata/briefs/gauge-stage.yaml
flags="--evaluations 2402 --seed 7"
scripts=$PWD/testdata/slurm
mkdir "$work/run" "$work/hand" "$work/xargs"

echo "== an array of 4 parts, then their merge as a dependent job"
cd "$work/run"
parts=$(sbatch --parsable --array=1-4 "$scripts/parts.sbatch" "$brief" parts $flags)
joined=$(sbatch --parsable --dependency="afterany:$parts" "$scripts/merge.sbatch" parts whole)
wait_for 600 sh -c "! squeue -h -j $joined | grep -q ."
if [ ! -s whole/front.json ]; then
	echo "check.sh: the merge wrote no front" >&2
	exit 1
fi

echo "== the same by hand, with one worker, in another order"
cd "$work/hand"
for k in 3 1 4 2; do
	"$LEGWRIGHT" search "$brief" -o parts/$k --part $k/4 --workers 1 --quiet $flags >/dev/null
done
"$LEGWRIGHT" merge parts/4 parts/2 parts/1 parts/3 -o whole --quiet >/dev/null

echo "== the same under xargs -P"
cd "$work/xargs"
seq 4 | xargs -P 2 -I{} "$LEGWRIGHT" search "$brief" -o parts/{} --part {}/4 --workers 1 --quiet $flags >/dev/null
"$LEGWRIGHT" merge parts/* -o whole --quiet >/dev/null

echo "== byte for byte"
for how in run xargs; do
	for k in 1 2 3 4; do diff -r "$work/hand/parts/$k" "$work/$how/parts/$k"; done
	diff -r "$work/hand/whole" "$work/$how/whole"
done
grep -c '"number"' "$work/run/whole/front.json" | grep -qx 4

echo "== a part that is missing"
rm -r "$work/hand/parts/2"
"$LEGWRIGHT" merge "$work"/hand/parts/* -o "$work/hand/three" 2>&1 >/dev/null | tee "$work/said" | grep -q 'merged from 3 of 4 parts; missing: 2'
echo "== done"
