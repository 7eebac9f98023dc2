package app.dewledger.field

import android.os.Bundle
import android.view.View
import androidx.activity.enableEdgeToEdge
import androidx.core.view.ViewCompat
import androidx.core.view.WindowInsetsCompat

class MainActivity : TauriActivity() {
  override fun onCreate(savedInstanceState: Bundle?) {
    enableEdgeToEdge()
    super.onCreate(savedInstanceState)
    keepClearOfBarsAndKeyboard(findViewById(android.R.id.content))
  }

  /**
   * Pads the screens by the system's bars, the camera's cut-out and the keyboard.
   *
   * The page is told nothing of them (the insets are consumed): older web views report zero to a page, newer ones the
   * true size, and a page that added its own would leave the space twice.
   */
  private fun keepClearOfBarsAndKeyboard(content: View) {
    ViewCompat.setOnApplyWindowInsetsListener(content) { view, insets ->
      val taken = insets.getInsets(
        WindowInsetsCompat.Type.systemBars() or
          WindowInsetsCompat.Type.displayCutout() or
          WindowInsetsCompat.Type.ime()
      )
      view.setPadding(taken.left, taken.top, taken.right, taken.bottom)
      WindowInsetsCompat.CONSUMED
    }
  }
}
