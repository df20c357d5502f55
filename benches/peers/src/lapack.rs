//! LAPACK opened at run time: `dpbtrf` and `dpbtrs` on band storage that is filled directly.
//!
//! The only unsafe code of this package. It rests on the published Fortran interface of the two routines and on buffers
//! whose sizes [`Banded`] fixes when it is made.
#![allow(unsafe_code, reason = "a library of another language, opened at run time")]

use crate::assembly::{Numbering, Symmetric};
use crate::{Failed, Peer};
use libloading::Library;
use std::ffi::{CStr, c_char, c_int};
use swaybound::response::{Forces, Members};

/// How to get the library, where it is absent.
pub const HINT: &str = "LAPACK is absent, its column is left out; on Debian: apt-get install libopenblas0-serial";

/// Where the library may stand, the one without threads first.
const PLACES: [&str; 4] = [
    "/usr/lib/x86_64-linux-gnu/openblas-serial/libopenblas.so.0",
    "/usr/lib/aarch64-linux-gnu/openblas-serial/libopenblas.so.0",
    "libopenblas.so.0",
    "libopenblas.so",
];

/// (uplo, n, kd, ab, ldab, info, length of uplo)
type Factorise =
    unsafe extern "C" fn(*const c_char, *const c_int, *const c_int, *mut f64, *const c_int, *mut c_int, usize);
/// (uplo, n, kd, nrhs, ab, ldab, b, ldb, info, length of uplo)
type Solve = unsafe extern "C" fn(
    *const c_char,
    *const c_int,
    *const c_int,
    *const c_int,
    *const f64,
    *const c_int,
    *mut f64,
    *const c_int,
    *mut c_int,
    usize,
);

/// The two routines, and what the library says of itself.
pub struct Lapack {
    factorise: Factorise,
    solve: Solve,
    /// Version and build, in the library's words.
    pub build: String,
    /// The processor that its kernels are for.
    pub core: String,
    /// Keeps the routines in memory.
    _library: Library,
}

impl Lapack {
    /// Opens the library, with one thread; `None` where there is none.
    pub fn open() -> Option<Self> {
        PLACES.iter().find_map(|place| Self::open_at(place))
    }

    fn open_at(place: &str) -> Option<Self> {
        // SAFETY: the named library is OpenBLAS, whose initialisers only ask the processor and the environment.
        let library = unsafe { Library::new(place) }.ok()?;
        // SAFETY: the types are those of LAPACK's Fortran interface with 32-bit integers, which this file name stands
        // for in Debian; the pointers live as long as `library`, which is kept beside them.
        let (factorise, solve) =
            unsafe { (*library.get::<Factorise>(b"dpbtrf_\0").ok()?, *library.get::<Solve>(b"dpbtrs_\0").ok()?) };
        // SAFETY: OpenBLAS declares `void openblas_set_num_threads(int)`.
        if let Ok(set) = unsafe { library.get::<unsafe extern "C" fn(c_int)>(b"openblas_set_num_threads\0") } {
            // SAFETY: as above; no other thread uses the library yet.
            unsafe { set(1) };
        }
        let build = words(&library, b"openblas_get_config\0");
        let core = words(&library, b"openblas_get_corename\0");
        Some(Self { factorise, solve, build, core, _library: library })
    }
}

/// What one of OpenBLAS's `char *f(void)` says.
fn words(library: &Library, name: &[u8]) -> String {
    // SAFETY: both names asked for are declared `char *f(void)` by OpenBLAS.
    let Ok(ask) = (unsafe { library.get::<unsafe extern "C" fn() -> *const c_char>(name) }) else {
        return "unknown".into();
    };
    // SAFETY: as above; the answer is a static string that ends in zero.
    unsafe { CStr::from_ptr(ask()) }.to_string_lossy().trim().to_owned()
}

/// Solves frames of one shape as banded systems.
pub struct Banded<'a> {
    lapack: &'a Lapack,
    numbering: Numbering,
    band: Band,
    moved: Vec<f64>,
}

/// The lower triangle in LAPACK's band storage: column by column, the diagonal first.
struct Band {
    half_bandwidth: usize,
    entries: Vec<f64>,
}

impl Symmetric for Band {
    #[inline(always)]
    fn put(&mut self, row: usize, column: usize, value: f64) {
        self.entries[row + column * self.half_bandwidth] = value;
    }
}

impl<'a> Banded<'a> {
    /// Room for frames numbered so.
    pub fn new(lapack: &'a Lapack, numbering: Numbering) -> Self {
        let (order, half_bandwidth) = (numbering.order(), numbering.half_bandwidth());
        let band = Band { half_bandwidth, entries: vec![0.0; order * (half_bandwidth + 1)] };
        Self { lapack, numbering, band, moved: vec![0.0; order] }
    }

    /// Factorises the band and solves in place of the load.
    fn solve_band(&mut self) -> Result<(), Failed> {
        let lower = c"L".as_ptr();
        let [order, half, rows, one] =
            [self.moved.len(), self.band.half_bandwidth, self.band.half_bandwidth + 1, 1].map(|size| size as c_int);
        let mut info = [0; 2];
        // SAFETY: `entries` holds `rows` x `order` numbers and `moved` `order` numbers, as made in `new` and never
        // resized; the sizes passed are theirs; every pointer outlives the calls.
        unsafe {
            (self.lapack.factorise)(lower, &order, &half, self.band.entries.as_mut_ptr(), &rows, &mut info[0], 1);
            let (entries, moved) = (self.band.entries.as_ptr(), self.moved.as_mut_ptr());
            (self.lapack.solve)(lower, &order, &half, &one, entries, &rows, moved, &order, &mut info[1], 1);
        }
        if info == [0; 2] { Ok(()) } else { Err(Failed::NotDefinite { peer: "LAPACK" }) }
    }
}

impl Peer<1> for Banded<'_> {
    fn solve(&mut self, members: &Members<1>, forces: &mut Forces<1>) -> Result<(), Failed> {
        self.band.entries.fill(0.0);
        self.numbering.assemble(members, &mut self.band, &mut self.moved);
        self.solve_band()?;
        self.numbering.recover(members, &self.moved, forces);
        Ok(())
    }
}
