//! The readers from outside (Open CASCADE, trimesh) in a pinned environment under `target/`.
//!
//! The environment is made once for each list of requirements and version of Python: built under a name of its own and
//! then renamed, so that one that exists is whole, whatever runs beside this or was broken off before. The first run
//! takes about a minute and needs the network; later ones need neither.

use crate::figures::Figures;
use std::ffi::OsStr;
use std::fs;
use std::path::{Path, PathBuf};
use std::process::{Command, Output};
use std::sync::LazyLock;

const REQUIREMENTS: &str = include_str!("outside/requirements.txt");

const REMEDY: &str = "The tests read what spanwise writes with Open CASCADE and trimesh. They need Python 3.11 to 3.14 with \
    venv and pip on the path, as `python3` or `python` (on Debian: apt install python3 python3-venv python3-pip), and \
    once the network, to install tests/outside/requirements.txt under target/.";

static PYTHON: LazyLock<PathBuf> =
    LazyLock::new(|| environment().unwrap_or_else(|fault| panic!("{fault}\n{REMEDY}")));

/// Runs a script of `tests/outside`; gives the JSON that it prints.
#[track_caller]
pub(crate) fn outside<S: AsRef<OsStr>>(script: &str, arguments: &[S]) -> Figures {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR"))
        .join("tests")
        .join("outside");
    let mut command = Command::new(&*PYTHON);
    command
        .arg(folder.join(script))
        .args(arguments)
        .env_remove("PYTHONPATH");
    // no compiled files beside the scripts, nothing from the user's own packages; the scripts' children inherit both
    command.envs([("PYTHONDONTWRITEBYTECODE", "1"), ("PYTHONNOUSERSITE", "1")]);
    let output = command
        .output()
        .unwrap_or_else(|fault| panic!("{}: {fault}", PYTHON.display()));
    assert!(output.status.success(), "{script} failed:\n{}", said(&output));
    Figures::parse(&String::from_utf8_lossy(&output.stdout))
}

/// The environment's interpreter; makes the environment where there is none.
fn environment() -> Result<PathBuf, String> {
    let (base, version) = interpreter()?;
    let name = format!("{:016x}", fingerprint(&[REQUIREMENTS, &version]));
    // CARGO_TARGET_TMPDIR is target/tmp
    let folder = Path::new(env!("CARGO_TARGET_TMPDIR")).with_file_name("outside-env");
    let finished = folder.join(&name);
    if works(&finished) {
        return Ok(python_in(&finished));
    }
    if finished.exists() {
        // its base interpreter is gone, or somebody took files out of it
        fs::remove_dir_all(&finished).map_err(|fault| format!("{}: {fault}", finished.display()))?;
    }
    let building = folder.join(format!("{name}.{}", std::process::id()));
    let made = build(&base, &building);
    if let Err(fault) = made {
        fs::remove_dir_all(&building).ok();
        return Err(fault);
    }
    if let Err(fault) = fs::rename(&building, &finished) {
        // another run was first
        fs::remove_dir_all(&building).ok();
        if !works(&finished) {
            return Err(format!("{}: {fault}", finished.display()));
        }
    }
    Ok(python_in(&finished))
}

/// Makes an environment with the pinned packages.
fn build(base: &str, folder: &Path) -> Result<(), String> {
    fs::create_dir_all(folder).map_err(|fault| format!("{}: {fault}", folder.display()))?;
    let list = folder.join("requirements.txt");
    fs::write(&list, REQUIREMENTS).map_err(|fault| format!("{}: {fault}", list.display()))?;
    step(
        "make a virtual environment",
        Command::new(base).args(["-m", "venv"]).arg(folder),
    )?;
    let mut install = Command::new(python_in(folder));
    install.args([
        "-m",
        "pip",
        "install",
        "--quiet",
        "--disable-pip-version-check",
        "--no-input",
        "--requirement",
    ]);
    step("install the pinned packages", install.arg(&list))
}

/// Runs one step of making the environment.
fn step(what: &str, command: &mut Command) -> Result<(), String> {
    let output = command
        .output()
        .map_err(|fault| format!("could not {what}: {fault}"))?;
    if output.status.success() {
        Ok(())
    } else {
        Err(format!("could not {what}:\n{}", said(&output)))
    }
}

/// The interpreter on the path and its version.
fn interpreter() -> Result<(String, String), String> {
    let mut unfit = Vec::new();
    for name in ["python3", "python"] {
        let print = "import sys; print('%d.%d' % sys.version_info[:2])";
        let Ok(output) = Command::new(name).args(["-c", print]).output() else {
            continue;
        };
        let version = String::from_utf8_lossy(&output.stdout).trim().to_owned();
        if output.status.success() && ["3.11", "3.12", "3.13", "3.14"].contains(&version.as_str()) {
            return Ok((name.to_owned(), version));
        }
        unfit.push(format!("`{name}` on the path is Python {version}."));
    }
    if unfit.is_empty() {
        unfit.push("There is neither `python3` nor `python` on the path.".to_owned());
    }
    Err(unfit.join(" "))
}

/// True where an environment is there and its packages can be loaded.
fn works(folder: &Path) -> bool {
    let mut command = Command::new(python_in(folder));
    command
        .args(["-s", "-c", "import OCP.STEPCAFControl, numpy, trimesh"])
        .env_remove("PYTHONPATH");
    command.output().is_ok_and(|output| output.status.success())
}

fn python_in(folder: &Path) -> PathBuf {
    if cfg!(windows) {
        folder.join("Scripts").join("python.exe")
    } else {
        folder.join("bin").join("python")
    }
}

fn said(output: &Output) -> String {
    format!(
        "{}{}",
        String::from_utf8_lossy(&output.stdout),
        String::from_utf8_lossy(&output.stderr)
    )
}

/// FNV-1a of some texts, each closed by a zero byte.
fn fingerprint(texts: &[&str]) -> u64 {
    let bytes = texts.iter().flat_map(|text| text.bytes().chain([0]));
    bytes.fold(0xcbf2_9ce4_8422_2325, |hash, byte| {
        (hash ^ u64::from(byte)).wrapping_mul(0x0100_0000_01b3)
    })
}

#[test]
fn a_text_that_is_no_step_file_is_not_readable() {
    let directory = crate::workdir::WorkDir::new();
    let found = outside("step_read.py", &[directory.write("text.step", "hello\n")]);
    assert!(!found.truth("0.readable"));
    assert!(!found.list("0.messages").is_empty());
}
