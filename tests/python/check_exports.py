"""Reads results and exports with independent libraries, and solves the exported systems again.

    check_exports.py LENZBORE FOLDER

LENZBORE is the program, FOLDER a folder to write to. What is checked:

- the systems of settled and alternating fields, solved by SciPy, give the drag, heat and impedance of the same grid level, and the
  field that the run has stored;
- J x B integrated over the cells of run.h5 gives that level's own drag;
- the VTK files and run.xdmf open in the VTK library with the numbers that run.h5 holds;
- the example in the README runs as it stands.
"""

import json
import subprocess
import sys
from pathlib import Path

import h5py
import numpy as np
import scipy.io
import scipy.sparse
import scipy.sparse.linalg
from vtkmodules.vtkCommonExecutionModel import vtkStreamingDemandDrivenPipeline
from vtkmodules.vtkIOXdmf2 import vtkXdmfReader
from vtkmodules.vtkIOXML import vtkXMLRectilinearGridReader
from vtkmodules.util.numpy_support import vtk_to_numpy

ROOT = Path(__file__).resolve().parents[2]
ARRAYS = ["flux_density_r_T", "flux_density_z_T", "current_density_phi_A_per_m2", "heat_density_W_per_m3"]


def close(what, found, wanted, relative):
    apart = np.max(np.abs(np.asarray(found) - np.asarray(wanted))) / np.max(np.abs(np.asarray(wanted)))
    verdict = "as it should" if apart <= relative else "TOO FAR"
    print(f"  {what}: {apart:.1e} apart, {relative:.0e} allowed: {verdict}")
    if not apart <= relative:
        sys.exit(f"{what}: found {found}, wanted {wanted}")


class Level:
    """One grid level's system."""

    def __init__(self, folder, about):
        def read(key):
            return scipy.io.mmread(folder / about["files"][key])

        self.K = scipy.sparse.csc_matrix(read("K"))
        self.G = scipy.sparse.csc_matrix(read("G")).diagonal()
        self.C = scipy.sparse.csc_matrix(read("C")) if "C" in about["files"] else None
        self.source, self.slope, self.static = (read(key).ravel() for key in ("source", "slope", "static"))
        self.linkage = about["static_linkage_A_Wb_per_rad"]
        self.rows = np.genfromtxt(
            folder / about["files"]["rows"], delimiter=",", names=True, dtype=None, encoding="utf-8"
        )


def solve_and_export(program, out, command, case, *more):
    subprocess.run([program, command, case, "--out", out, *more], check=True, stdout=subprocess.DEVNULL)
    subprocess.run([program, "export", out, "--to", "matrix-market"], check=True, stdout=subprocess.DEVNULL)
    folder = Path(f"{out}-matrix-market")
    about = json.loads((folder / "export.json").read_text())["about"]
    summary = json.loads((out / "summary.json").read_text())
    return summary, about["drive"], [Level(folder, level) for level in about["levels"]]


def field_at(out, level, name, snapshot=0):
    """An array of run.h5 at the rows of the finest level, [z, r] at nodes."""
    with h5py.File(out / "run.h5") as f:
        return f[name][snapshot][level.rows["node_z"], level.rows["node_r"]]


def settled(program, folder):
    print("settled fields at uniform speed")
    out = folder / "steady"
    summary, drive, levels = solve_and_export(program, out, "run", ROOT / "examples/two-layer-steady.toml")
    v = drive["velocity_m_per_s"]
    for number, level in enumerate(levels):
        driven = v * level.G * level.slope
        psi = scipy.sparse.linalg.spsolve(scipy.sparse.csc_matrix(level.K - v * level.C), driven)
        current = v * (level.C @ psi) + driven
        drag = 2 * np.pi * level.slope @ current
        ring = level.G > 0
        heat = 2 * np.pi * np.sum(current[ring] ** 2 / level.G[ring])
        close(f"drag of level {number + 1}", drag, summary["figures"]["drag"]["levels"][number], 1e-9)
        close(f"heat of level {number + 1}", heat, summary["figures"]["dissipated_power"]["levels"][number], 1e-9)
    close("field of the finest level", psi + level.static, field_at(out, level, "snapshots/psi_reaction_Wb_per_rad"), 1e-8)
    return out, summary


def alternating(program, folder):
    print("alternating fields, one frequency")
    out = folder / "alternating"
    one = ["--set", "travel.frequency=2 kHz"]
    text = (ROOT / "examples/coil-probe.toml").read_text()
    lines = [line for line in text.splitlines() if not line.startswith(("frequencies", "points"))]
    case = folder / "one-frequency.toml"
    case.write_text("\n".join(lines) + "\n")
    summary, drive, levels = solve_and_export(program, out, "run", case, *one)
    (omega,), ampere = drive["omega_rad_per_s"], drive["current_A"]
    for number, level in enumerate(levels):
        system = scipy.sparse.csc_matrix(level.K + 1j * omega * scipy.sparse.diags(level.G))
        psi = scipy.sparse.linalg.spsolve(system, -1j * omega * level.G * level.source)
        current = -1j * omega * level.G * (level.source + psi)
        change = 2j * np.pi * omega / ampere**2 * (level.source @ current + level.linkage)
        for name, found in (("resistance_change", change.real), ("reactance_change", change.imag)):
            close(f"{name} of level {number + 1}", found, summary["figures"][name]["levels"][number], 1e-8)
    close("real part of the field", psi.real + level.static, field_at(out, level, "snapshots/psi_reaction_Wb_per_rad"), 1e-8)
    return out


def curve(program, folder):
    print("a curve, at vanishing speed and at the critical speed")
    out = folder / "curve"
    summary, _, levels = solve_and_export(program, out, "curve", ROOT / "examples/arrest-sleeve.toml")
    for number, level in enumerate(levels):
        coefficient = 2 * np.pi * np.sum(level.G * level.slope**2)
        wanted = summary["figures"]["damping_coefficient_zero_speed"]["levels"][number]
        close(f"damping coefficient of level {number + 1}", coefficient, wanted, 1e-9)
        v = summary["figures"]["critical_speed"]["value"]
        driven = v * level.G * level.slope
        psi = scipy.sparse.linalg.spsolve(scipy.sparse.csc_matrix(level.K - v * level.C), driven)
        drag = 2 * np.pi * level.slope @ (v * (level.C @ psi) + driven)
        close(f"greatest drag of level {number + 1}", drag, summary["figures"]["drag_max"]["levels"][number], 1e-8)


def integrate_forces(out, summary):
    print("J x B over the cells of run.h5")
    with h5py.File(out / "run.h5") as f:
        r, z = f["grid/r_m"][:], f["grid/z_m"][:]
        j = f["snapshots/current_density_phi_A_per_m2"][0]
        b = f["snapshots/flux_density_r_T"][0]
        heat = f["snapshots/heat_density_W_per_m3"][0]
        level = f["levels/drag"][-1]
        power = f["levels/dissipated_power"][-1]
        assert f["levels/drag"].attrs["units"] == "N"
    volume = np.outer(np.diff(z), np.pi * np.diff(r**2))
    # J x B along z is -J_phi B_r. The mover travels upward: the wall is dragged along, and the mover feels the opposite. Midpoints of
    # cells: second order in their size, as the level itself.
    drag = np.sum(-j * b * volume)
    coarse = abs(summary["figures"]["drag"]["levels"][0] / summary["figures"]["drag"]["value"] - 1)
    print(f"  the coarsest level is {coarse:.1e} off the extrapolated drag")
    close("drag", drag, level, 5e-3)
    close("heat", np.sum(heat * volume), power, 5e-3)


def opened(reader):
    reader.Update()
    return reader.GetOutputDataObject(0)


def visualisation(program, folder):
    print("fields over time in the VTK library")
    out = folder / "travel"
    case = ROOT / "examples/latch-damper.toml"
    subprocess.run([program, "run", case, "--out", out], check=True, stdout=subprocess.DEVNULL)
    subprocess.run([program, "export", out, "--to", "vtk"], check=True, stdout=subprocess.DEVNULL)
    with h5py.File(out / "run.h5") as f:
        times = f["snapshots/time_s"][:]
        r, z = f["grid/r_m"][:], f["grid/z_m"][:]
        arrays = {name: f[f"snapshots/{name}"][:] for name in ARRAYS}
        psi = f["snapshots/psi_total_Wb_per_rad"][:]
    files = sorted(Path(f"{out}-vtk").glob("fields-*.vtr"))
    assert len(files) == len(times) > 2
    for k, file in enumerate(files):
        reader = vtkXMLRectilinearGridReader()
        reader.SetFileName(str(file))
        grid = opened(reader)
        assert grid.GetDimensions() == (len(r), len(z), 1)
        assert np.array_equal(vtk_to_numpy(grid.GetXCoordinates()), r)
        assert np.array_equal(vtk_to_numpy(grid.GetYCoordinates()), z)
        for name, values in arrays.items():
            assert np.array_equal(vtk_to_numpy(grid.GetCellData().GetArray(name)), values[k].ravel()), name
        assert np.array_equal(vtk_to_numpy(grid.GetPointData().GetArray("psi_total_Wb_per_rad")), psi[k].ravel())
    print(f"  {len(files)} files hold what run.h5 holds")
    index(out, times, r, z, arrays, psi)


def index(out, times, r, z, arrays, psi):
    """run.xdmf through the VTK library's own reader of that format."""
    reader = vtkXdmfReader()
    reader.SetFileName(str(out / "run.xdmf"))
    reader.UpdateInformation()
    steps = reader.GetOutputInformation(0).Get(vtkStreamingDemandDrivenPipeline.TIME_STEPS())
    assert np.allclose(steps, times), "instants of run.xdmf"
    for k, time in enumerate(times):
        reader.UpdateTimeStep(time)
        grid = reader.GetOutputDataObject(0)
        while grid.IsA("vtkMultiBlockDataSet"):
            grid = grid.GetBlock(0)
        assert np.array_equal(vtk_to_numpy(grid.GetXCoordinates()), r)
        assert np.array_equal(vtk_to_numpy(grid.GetYCoordinates()), z)
        for name, values in arrays.items():
            found = vtk_to_numpy(grid.GetCellData().GetArray(name))
            assert np.array_equal(found, values[k].ravel()), f"{name} of run.xdmf at {time} s"
        assert np.array_equal(vtk_to_numpy(grid.GetPointData().GetArray("psi_total_Wb_per_rad")), psi[k].ravel())
    print(f"  run.xdmf: {len(times)} instants hold what run.h5 holds")


def readme(program, folder):
    print("the example of the README")
    text = (ROOT / "README.md").read_text()
    (block,) = [b.split("```")[0] for b in text.split("```python\n")[1:]]
    case = ROOT / "examples/arrest-sleeve.toml"
    subprocess.run([program, "run", case, "--out", folder / "out/arrest-sleeve"], check=True, stdout=subprocess.DEVNULL)
    ran = subprocess.run([sys.executable, "-c", block], cwd=folder, check=True, capture_output=True, text=True)
    print("  " + ran.stdout.strip())
    assert "A/m2 at r =" in ran.stdout
    peak = float(ran.stdout.split()[0])
    figures = json.loads((folder / "out/arrest-sleeve/summary.json").read_text())["figures"]
    close("greatest stored current density", peak, figures["current_density_peak"]["value"], 0.2)


def main():
    program, folder = Path(sys.argv[1]).resolve(), Path(sys.argv[2]).resolve()
    folder.mkdir(parents=True, exist_ok=True)
    out, summary = settled(program, folder)
    integrate_forces(out, summary)
    alternating(program, folder)
    curve(program, folder)
    visualisation(program, folder)
    readme(program, folder)
    print("all as it should be")


if __name__ == "__main__":
    main()
