#!/usr/bin/env python3
"""Reference values of the second-stage families; extends gen.py.

gen2.py verify REF.json [PREFIX...]   recompute the cases that this program knows
gen2.py make OUT.json [PREFIX...]     write the cases of cases2.py (all, or those whose name starts so); kept values are reused
gen2.py triples SEED COUNT FAMILY OUT.json.gz   random bodies and points of a family of closed.py (closed forms) or sampler.py
                                                (integrals), values of >= 20 digits
gen2.py brute FAMILY...               values of a family of closed.py against quadrature of the dipole density: digits of agreement
"""
import json
import os
import sys
import time

from num import *
import values
import values2
import values3
from gen import certain, fr, texts, write

gen.VALUE.update(values.VALUE)
gen.VALUE.update(values2.VALUE)
gen.VALUE.update(values3.VALUE)


def make(path, prefixes):
    import cases2
    import cases3  # noqa: F401  (adds its groups)
    old = {c["id"]: c for c in json.load(open(path))} if os.path.exists(path) else {}
    order = list(old)
    for case in cases2.all_cases((lambda n: n.startswith(tuple(prefixes))) if prefixes else None):
        t0 = time.time()
        out = {k: case[k] for k in ("id", "body", "polarization", "points")}
        if case["id"] in old and all(json.dumps(out[k]) == json.dumps(old[case["id"]][k]) for k in out):
            old[case["id"]].update(tags=case["tags"])
            continue
        pts, tags, vals = [], [], []
        for p, t in zip(case["points"], case["tags"]):
            try:
                vals.append(texts(certain(case["body"], case["polarization"], fr(p)), case["size"]))
            except Exception as e:
                print("   no value:", case["id"], t, p, repr(e)[:120], flush=True)
                continue
            pts.append(p)
            tags.append(t)
        out["points"] = pts
        out["phi"], out["g"], out["region"] = ([v[k] for v in vals] for k in range(3))
        out["tags"] = tags
        out.update(case["words"])
        old[out["id"]] = out
        write(path, list(old.values()))
        print(out["id"], len(vals), "%.1fs" % (time.time() - t0), flush=True)


def verify(path, prefixes):
    for case in json.load(open(path)):
        if case["body"]["type"] not in gen.VALUE or not case["id"].startswith(tuple(prefixes)) or case["polarization"]["kind"] == "flux_tube":
            continue
        bad = 0
        for i, x in enumerate(case["points"]):
            v = texts(certain(case["body"], case["polarization"], fr(x)), 1)
            if v != (case["phi"][i], case["g"][i], case["region"][i]):
                bad += 1
                print("  differs", case["id"], case["tags"][i], x, v, case["phi"][i], case["g"][i], case["region"][i])
        print("%-30s %3d points, %d differ" % (case["id"], len(case["points"]), bad), flush=True)


if __name__ == "__main__":
    if sys.argv[1] == "make":
        make(sys.argv[2], sys.argv[3:])
    elif sys.argv[1] == "verify":
        verify(sys.argv[2], sys.argv[3:] or [""])
    elif sys.argv[1] == "brute":
        import closed
        for family in sys.argv[2:]:
            closed.brute(family)
    elif sys.argv[1] == "triples":
        import closed
        import sampler
        seed, count, family, path = sys.argv[2], int(sys.argv[3]), sys.argv[4], sys.argv[5]
        (closed if family in closed.FAMILIES else sampler).triples(seed, count, family, path)
