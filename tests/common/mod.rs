//! A folder with an area in it, and the program run on it. All data in these tests is invented.
#![allow(dead_code)] // each test binary uses a part of it

use std::fs;
use std::path::{Path, PathBuf};
use std::process::{Command, Output};
use tempfile::TempDir;

/// A temporary folder to put files into and run the program in.
pub struct Area {
    home: TempDir,
}

/// What a run said.
pub struct Said {
    pub code: i32,
    pub out: String,
    pub err: String,
}

impl Area {
    /// An empty folder.
    pub fn new() -> Self {
        Self { home: tempfile::tempdir().unwrap() }
    }
    /// A folder with files in it.
    pub fn with(files: &[(&str, &str)]) -> Self {
        let area = Self::new();
        for (name, text) in files {
            area.put(name, text);
        }
        area
    }
    pub fn path(&self, name: &str) -> PathBuf {
        self.home.path().join(name)
    }
    pub fn put(&self, name: &str, content: impl AsRef<[u8]>) {
        let path = self.path(name);
        fs::create_dir_all(path.parent().unwrap()).unwrap();
        fs::write(path, content).unwrap();
    }
    /// Runs the program in the folder.
    pub fn homocline(&self, args: &[&str]) -> Said {
        said(Command::new(env!("CARGO_BIN_EXE_homocline")).args(args).current_dir(self.home.path()).output().unwrap())
    }
    /// The summary that a run wrote.
    pub fn summary(&self, folder: &str) -> serde_json::Value {
        let text = fs::read_to_string(self.path(folder).join("summary.json")).expect("a summary was written");
        serde_json::from_str(&text).expect("the summary is JSON")
    }
    /// True where nothing at all was written to `folder`.
    pub fn nothing_in(&self, folder: &str) -> bool {
        let path = self.path(folder);
        !path.exists() || fs::read_dir(path).unwrap().next().is_none()
    }
}

fn said(output: Output) -> Said {
    Said {
        code: output.status.code().expect("not killed"),
        out: String::from_utf8(output.stdout).unwrap(),
        err: String::from_utf8(output.stderr).unwrap(),
    }
}

/// Six good bedding readings in UTM zone 33.
pub const STATIONS: &str = "id,x,y,structure,strike,dip\n\
    a,500100,5400100,bedding,10,30\n\
    b,500200,5400200,bedding,14,33\n\
    c,500300,5400150,bedding,7,28\n\
    d,500400,5400300,bedding,12,35\n\
    e,500500,5400250,bedding,9,31\n\
    f,500600,5400350,bedding,11,29\n";

/// An area file for [`STATIONS`] as `stations.csv`.
pub const AREA: &str = "[stations]\nfile = \"stations.csv\"\ncrs = \"EPSG:32633\"\nnorth = \"true\"\n";

/// The path of a file in the repository.
pub fn repository(path: &str) -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join(path)
}
