//! The demo scenarios, built into the program. All invented.

/// One example.
pub struct Example {
    /// File name in `scenarios/`.
    pub file_name: &'static str,
    /// Its text.
    pub text: &'static str,
}

macro_rules! example {
    ($file_name:literal) => {
        Example { file_name: $file_name, text: include_str!(concat!("../../scenarios/", $file_name)) }
    };
}

/// All examples; the first is shown on first start.
pub const EXAMPLES: &[Example] = &[
    example!("trailer-water-bowser.ron"),
    example!("shuttle-rinse-bath.ron"),
    example!("round-barrel-lengthwise.ron"),
    example!("hopper-hydraulic-reservoir.ron"),
    example!("ship-header-tank.ron"),
    example!("hoist-dip-vat.ron"),
    example!("small-sample-tray.ron"),
    example!("fire-tank-lengthwise.ron"),
    example!("fire-tank-crosswise.ron"),
    example!("tanker-barrel-surge-plates.ron"),
    example!("weir-box-release.ron"),
];
