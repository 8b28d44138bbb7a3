//! What is remembered from one start to the next: how things are shown, recent files. Never a study.

use std::path::{Path, PathBuf};

use egui::ThemePreference;
use serde::{Deserialize, Serialize};

use crate::units::UnitSystem;

use super::layout::Sizes;

const RECENT: usize = 8;

/// The settings. What an older version did not know takes its first value.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct Settings {
    /// Units shown.
    pub units: UnitSystem,
    /// Light, dark, or as the system says.
    pub theme: ThemePreference,
    /// Dragged dividers.
    pub sizes: Sizes,
    /// Files opened or saved, the last one first.
    pub recent: Vec<PathBuf>,
}

impl Default for Settings {
    fn default() -> Self {
        Settings {
            units: UnitSystem::default(),
            theme: ThemePreference::System,
            sizes: Sizes::default(),
            recent: Vec::new(),
        }
    }
}

impl Settings {
    /// Puts a file first among the recent ones.
    pub fn remember(&mut self, path: &Path) {
        self.recent.retain(|known| known != path);
        self.recent.insert(0, path.to_owned());
        self.recent.truncate(RECENT);
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_last_file_comes_first_and_stands_once() {
        let mut settings = Settings::default();
        for i in 0..20 {
            settings.remember(Path::new(&format!("/tank {i}.ron")));
        }
        settings.remember(Path::new("/tank 15.ron"));
        assert_eq!(settings.recent.len(), RECENT);
        assert_eq!(settings.recent[0], Path::new("/tank 15.ron"));
        assert_eq!(settings.recent.iter().filter(|p| p.ends_with("tank 15.ron")).count(), 1);
    }

    #[test]
    fn settings_of_another_version_are_still_read() {
        let read: Settings = ron::from_str("(units: UsCustomary)").unwrap();
        assert_eq!(read, Settings { units: UnitSystem::UsCustomary, ..Default::default() });
    }
}
