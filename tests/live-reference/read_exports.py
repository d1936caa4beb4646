"""Reads exported files with general-purpose clients and reports each disagreement.

    read_exports.py FOLDER

Debian packages: python3-astropy python3-pandas python3-h5py fitsverify stilts
libxml2-utils poppler-utils (pdffonts). A client that is not installed is reported
as skipped. Run with /usr/bin/python3: another python3 on the path may lack Astropy.

Tables with the same stem (limits.csv, limits.ecsv, limits.vot, ...) must hold the same
columns, rows and numbers: floats are compared exactly, missing cells with missing cells.
Exit status: 0 all agree, 1 some do not.
"""
import glob, json, os, re, shutil, subprocess, sys, unicodedata, warnings
import numpy as np

bad = []
done = {}


def fail(path, text):
    bad.append(f"{os.path.basename(path)}: {text}")


def run(path, *cmd):
    """Output of a command, or None where it is not installed."""
    if not shutil.which(cmd[0]):
        done[f"skipped {cmd[0]}"] = done.get(f"skipped {cmd[0]}", 0) + 1
        return None
    done[cmd[0]] = done.get(cmd[0], 0) + 1
    p = subprocess.run(cmd, capture_output=True, text=True)
    return p.returncode, p.stdout + p.stderr


def cells(table):
    """name -> list of python values, None where masked, NaN or an empty string."""
    out = {}
    for name in table.colnames:
        col = []
        for v in table[name]:
            if v is np.ma.masked or v is None:
                v = None
            elif isinstance(v, bytes):
                v = v.decode().rstrip() or None
            elif isinstance(v, (str, np.str_)):
                v = str(v).rstrip() or None
            elif isinstance(v, (bool, np.bool_)):
                v = str(bool(v))
            elif isinstance(v, (float, np.floating)):
                v = None if np.isnan(v) else float(v)
            elif isinstance(v, (int, np.integer)):
                v = float(v) if abs(int(v)) < 2**53 else int(v)
            col.append(v)
        out[name] = col
    return out


def ascii_only(v):
    """FITS strings are ASCII: accents are dropped, other signs become "?"."""
    if not isinstance(v, str):
        return v
    v = "".join(c for c in unicodedata.normalize("NFKD", v) if not unicodedata.combining(c))
    return v.encode("ascii", "replace").decode()


def mass_unit(path, table, strict):
    """A mass must be convertible to kg (FITS has no Jupiter mass: checked as text)."""
    from astropy import units as u
    for name in table.colnames:
        if re.fullmatch(r"mass(_(min|max|error.*))?", name):
            unit = table[name].unit
            if unit is None:
                fail(path, f'column "{name}" has no unit')
            elif strict:
                try:
                    unit.to(u.kg)
                except Exception:
                    fail(path, f'unit "{unit}" of "{name}" is not a mass to Astropy')
            elif str(unit) not in ("Mjup", "solMass"):
                fail(path, f'unit "{unit}" of "{name}"; expected Mjup or solMass')


def main(folder):
    from astropy.io import fits
    from astropy.table import Table
    import astropy.io.votable as votable
    import pandas
    tables = {}
    for path in sorted(glob.glob(os.path.join(folder, "**", "*"), recursive=True)):
        if not os.path.isfile(path):
            continue
        stem, ext = os.path.splitext(os.path.relpath(path, folder))
        try:
            with warnings.catch_warnings(record=True) as caught:
                warnings.simplefilter("always")
                t = None
                if ext == ".csv":
                    t = Table.read(path, format="ascii.csv")
                    n = len(pandas.read_csv(path))
                    if n != len(t):
                        fail(path, f"pandas reads {n} rows, Astropy {len(t)}")
                elif ext == ".ecsv":
                    t = Table.read(path, format="ascii.ecsv")
                    mass_unit(path, t, True)
                    n = len(pandas.read_csv(path, comment="#"))
                    if n != len(t):
                        fail(path, f"pandas reads {n} rows, Astropy {len(t)}")
                elif ext == ".vot":
                    t = Table.read(path, format="votable")
                    mass_unit(path, t, True)
                    votable.parse(path, verify="exception")
                    r = run(path, "stilts", "votlint", path)
                    if r and r[1].strip():
                        fail(path, "votlint: " + r[1].strip().splitlines()[0])
                    xsd = os.path.join(os.path.dirname(votable.__file__), "data", "VOTable.v1.3.xsd")
                    r = run(path, "xmllint", "--noout", "--nonet", "--schema", xsd, path)
                    if r and r[0]:
                        fail(path, "xmllint: " + r[1].strip().splitlines()[0])
                elif ext == ".fits":
                    with fits.open(path, checksum=True) as h:
                        h.verify("exception")
                        for x in h:
                            x.data
                        kinds = [type(x).__name__ for x in h]
                    if kinds.count("BinTableHDU") == 1 and "ImageHDU" not in kinds:
                        t = Table.read(path)
                        mass_unit(path, t, False)
                    r = run(path, "fitsverify", "-q", path)
                    if r and "OK" not in r[1]:
                        fail(path, "fitsverify: " + r[1].strip())
                elif ext == ".txt" and open(path, errors="replace").readline().startswith("Title:"):
                    Table.read(path, format="ascii.mrt")
                elif ext in (".npy", ".npz"):
                    a = np.load(path, allow_pickle=False)
                    for k in getattr(a, "files", []):
                        a[k]
                elif ext in (".h5", ".hdf5"):
                    import h5py
                    with h5py.File(path) as h:
                        h.visititems(lambda name, x: x[()] if isinstance(x, h5py.Dataset) else None)
                elif ext in (".json", ".jsonld"):
                    json.loads(open(path, encoding="utf-8").read(),
                               parse_constant=lambda c: fail(path, f"holds {c}, which is not JSON"))
                elif ext == ".svg":
                    text = open(path, encoding="utf-8").read()
                    r = run(path, "xmllint", "--noout", "--nonet", path)
                    if r and r[0]:
                        fail(path, "not well-formed: " + r[1].splitlines()[0])
                    for word in ("<foreignObject", "<script", "@import", "var(--", "currentColor"):
                        if word in text:
                            fail(path, f"holds {word}, which other programs do not draw")
                    if re.search(r"(href|url\()\s*=?\s*[\"']?https?:", text):
                        fail(path, "refers to something outside the file")
                elif ext == ".pdf":
                    r = run(path, "pdffonts", path)
                    if r:
                        for line in r[1].splitlines()[2:]:
                            if len(line.split()) >= 6 and line.split()[-5] != "yes":
                                fail(path, "a font is not embedded: " + line)
                        if " Type 3 " in r[1]:
                            fail(path, "holds a Type 3 font, which journals refuse")
                else:
                    continue
                done[ext] = done.get(ext, 0) + 1
                texts = [str(w.message) for w in caught]
                known = lambda m: "Mjup" in m and ext == ".fits"
                for m in texts:
                    if not known(m) and "unclosed" not in m:
                        fail(path, "warning: " + m.splitlines()[0][:150])
            if t is not None:
                tables.setdefault(stem, []).append((path, cells(t)))
        except Exception as e:
            fail(path, f"{type(e).__name__}: {str(e).splitlines()[0][:200] if str(e) else ''}")
    for stem, group in tables.items():
        path0, first = group[0]
        for path, other in group[1:]:
            if list(first) != list(other):
                fail(path, f"columns {list(other)} differ from {os.path.basename(path0)} {list(first)}")
                continue
            for name in first:
                for i, (a, b) in enumerate(zip(first[name], other[name])):
                    if path.endswith(".fits") or path0.endswith(".fits"):
                        a, b = ascii_only(a), ascii_only(b)
                    if a != b:
                        fail(path, f'row {i + 1}, "{name}": {b!r}, and {a!r} in {os.path.basename(path0)}')
                if len(first[name]) != len(other[name]):
                    fail(path, f"{len(other[name])} rows, and {len(first[name])} in {os.path.basename(path0)}")
                    break
    print(", ".join(f"{k}: {v}" for k, v in sorted(done.items())))
    print("\n".join(bad) if bad else "all agree")
    return 1 if bad else 0


if __name__ == "__main__":
    if len(sys.argv) != 2:
        sys.exit(__doc__)
    sys.exit(main(sys.argv[1]))
