//! A seat at a pseudo-terminal with the program running in it. Nothing sleeps: what is waited for is
//! looked at each time the program has written something, up to a bound.

use std::io::{Read as _, Write};
use std::num::NonZeroU16;
use std::path::Path;
use std::process::Command;
use std::sync::{Arc, Condvar, Mutex};
use std::time::{Duration, Instant};

use portable_pty::{
    Child, CommandBuilder, ExitStatus, MasterPty, PtySize, SlavePty, native_pty_system,
};

/// Far longer than anything waited for takes on a busy machine.
const AT_MOST: Duration = Duration::from_secs(30);

/// The built-in site and its night, which every test opens.
pub const EVENING: &str = "2026-12-01T21:30:05Z";

/// What has come from the program so far.
struct Heard {
    terminal: vt100::Parser,
    ended: bool,
}

/// A seat at a pseudo-terminal.
pub struct Seat {
    master: Box<dyn MasterPty + Send>,
    /// Held open, so that the terminal outlives the program.
    _slave: Box<dyn SlavePty + Send>,
    keys: Box<dyn Write + Send>,
    child: Box<dyn Child + Send + Sync>,
    heard: Arc<(Mutex<Heard>, Condvar)>,
    /// The modes of the terminal before the program took it.
    modes_before: String,
}

impl Seat {
    /// Runs the program in a home of its own, on a journal there.
    pub fn open(home: &Path, (width, height): (u16, u16)) -> Self {
        let size = PtySize {
            rows: height,
            cols: width,
            ..PtySize::default()
        };
        let pair = native_pty_system().openpty(size).unwrap();
        let mut command = CommandBuilder::new(env!("CARGO_BIN_EXE_nonius"));
        command.env_clear();
        command.env("HOME", home);
        command.env("TERM", "xterm-256color");
        command.env("LANG", "C.UTF-8");
        command.args(["--site", "tarn-hollow", "--at", EVENING]);
        command.arg("--night");
        command.arg(home.join("night.jsonl"));
        command.cwd(home);
        let modes_before = modes(pair.master.as_ref());
        let child = pair.slave.spawn_command(command).unwrap();
        let terminal = vt100::Parser::new(
            NonZeroU16::new(height).unwrap(),
            NonZeroU16::new(width).unwrap(),
            0,
        );
        let heard = Arc::new((
            Mutex::new(Heard {
                terminal,
                ended: false,
            }),
            Condvar::new(),
        ));
        listen(&heard, pair.master.try_clone_reader().unwrap());
        Self {
            keys: pair.master.take_writer().unwrap(),
            master: pair.master,
            _slave: pair.slave,
            child,
            heard,
            modes_before,
        }
    }

    /// Types.
    pub fn types(&mut self, keys: &str) {
        self.keys.write_all(keys.as_bytes()).unwrap();
        self.keys.flush().unwrap();
    }

    /// Strikes one key, a good second after whatever was struck before: a key too close to one that
    /// changed the record is taken for the same stroke of a glove.
    pub fn strikes(&mut self, key: &str) {
        for _ in 0..2 {
            let clock = |screen: &vt100::Screen| screen.rows(0, 200).nth(1);
            let before = self.looks(clock);
            self.waits_until("the next second", |screen| clock(screen) != before);
        }
        self.types(key);
    }

    /// Waits until the screen is as wanted.
    pub fn waits_until(&self, what: &str, wanted: impl Fn(&vt100::Screen) -> bool) {
        let (heard, news) = &*self.heard;
        let started = Instant::now();
        let mut heard = heard.lock().unwrap();
        while !wanted(heard.terminal.screen()) {
            let left = AT_MOST.saturating_sub(started.elapsed());
            let contents = heard.terminal.screen().contents();
            assert!(!left.is_zero(), "never: {what}\n{contents}");
            heard = news.wait_timeout(heard, left).unwrap().0;
        }
    }

    /// Waits until the screen says these words.
    pub fn waits_for(&self, words: &str) {
        self.waits_until(words, |screen| screen.contents().contains(words));
    }

    /// What the screen says.
    pub fn says(&self) -> String {
        self.heard.0.lock().unwrap().terminal.screen().contents()
    }

    /// Looks at the screen.
    pub fn looks<T>(&self, look: impl Fn(&vt100::Screen) -> T) -> T {
        look(self.heard.0.lock().unwrap().terminal.screen())
    }

    /// Gives the terminal another size.
    pub fn resizes(&self, width: u16, height: u16) {
        let (rows, cols) = (height, width);
        let size = PtySize {
            rows,
            cols,
            ..PtySize::default()
        };
        self.heard.0.lock().unwrap().terminal.screen_mut().set_size(
            NonZeroU16::new(rows).unwrap(),
            NonZeroU16::new(cols).unwrap(),
        );
        self.master.resize(size).unwrap();
    }

    /// Sends the program a signal by its name.
    pub fn signals(&self, name: &str) {
        let process = self.child.process_id().unwrap().to_string();
        let sent = Command::new("kill").args(["-s", name, &process]).status();
        assert!(sent.unwrap().success());
    }

    /// Waits until the program has ended.
    pub fn ends(&mut self) -> ExitStatus {
        let started = Instant::now();
        loop {
            if let Some(status) = self.child.try_wait().unwrap() {
                return status;
            }
            assert!(started.elapsed() < AT_MOST, "never ended\n{}", self.says());
            std::thread::yield_now();
        }
    }

    /// True if the terminal's modes are those from before the program took it.
    pub fn modes_are_as_before(&self) -> bool {
        modes(self.master.as_ref()) == self.modes_before
    }

    /// Waits until the terminal has been given back: ordinary screen, cursor, no bracketed paste.
    pub fn gets_the_terminal_back(&self) {
        self.waits_until("the terminal given back", |screen| {
            !screen.alternate_screen() && !screen.hide_cursor() && !screen.bracketed_paste()
        });
        let started = Instant::now();
        while !self.modes_are_as_before() {
            assert!(started.elapsed() < AT_MOST, "the modes stay raw");
            std::thread::yield_now();
        }
    }
}

impl Drop for Seat {
    fn drop(&mut self) {
        let _ = self.child.kill();
        let _ = self.child.wait();
    }
}

fn modes(master: &dyn MasterPty) -> String {
    format!("{:?}", master.get_termios().unwrap())
}

fn listen(heard: &Arc<(Mutex<Heard>, Condvar)>, mut output: Box<dyn std::io::Read + Send>) {
    let heard = Arc::clone(heard);
    std::thread::spawn(move || {
        let mut bytes = [0; 4096];
        loop {
            let read = output.read(&mut bytes).unwrap_or(0);
            let (heard, news) = &*heard;
            let mut heard = heard.lock().unwrap();
            heard.ended = read == 0;
            heard.terminal.process(&bytes[..read]);
            news.notify_all();
            if heard.ended {
                return;
            }
        }
    });
}
