//! The known word nearest to a misspelt one.

/// The word of `known` that `word` was probably meant to be, if any is near enough: the same but
/// for capitals, `-` and `_`, else at a small edit distance.
pub(super) fn nearest<'k>(
    word: &str,
    known: impl IntoIterator<Item = &'k str> + Clone,
) -> Option<&'k str> {
    if word.len() > 60 {
        return None;
    }
    let plain = |text: &str| text.to_lowercase().replace(['-', ' '], "_");
    let sought = plain(word);
    if let Some(same) = known.clone().into_iter().find(|k| plain(k) == sought) {
        return Some(same);
    }
    let allowed = match word.chars().count() {
        0..=1 => return None,
        2..=3 => 1,
        4..=7 => 2,
        _ => 3,
    };
    known
        .into_iter()
        .map(|k| (strsim::osa_distance(&plain(k), &sought), k))
        .filter(|(distance, _)| *distance <= allowed)
        .min_by_key(|(distance, _)| *distance)
        .map(|(_, k)| k)
}

/// `text` for a message: cut short where it is long.
pub(super) fn excerpt(text: &str) -> String {
    match text.char_indices().nth(60) {
        Some((end, _)) => format!("{}...", &text[..end]),
        None => text.to_string(),
    }
}
